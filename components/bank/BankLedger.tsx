import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerCell, LedgerColumn, LedgerRow as Line } from '@/components/ui/ledger/model';
import { LinkButton } from '@/components/ui/LinkButton';
import { StateMark } from '@/components/ui/StateMark';
import { kindsInWords } from '@/lib/bank/model';
import type { CheckSummary, LedgerRow } from '@/lib/bank/views';

const columns: LedgerColumn[] = [
  { key: 'title', title: 'Template' },
  { key: 'area', title: 'Area', choose: true },
  { key: 'parts', title: 'Parts' },
  { key: 'level', title: 'Level', figures: 0, rule: true, choose: true },
  { key: 'marks', title: 'Marks', figures: true },
  { key: 'minutes', title: 'Min', figures: true },
  { key: 'version', title: 'Ver.', figures: 0 },
  { key: 'forms', title: 'Forms', figures: 0 },
  { key: 'state', title: 'State', rule: true, choose: true },
  { key: 'check', title: 'Check' },
  { key: 'changed', title: 'Changed', figures: true },
  { key: 'by', title: 'Changed by', hidden: true },
  { key: 'cautions', title: 'Cautions', hidden: true },
  { key: 'slug', title: 'Slug', hidden: true },
];

/** "40 of 2,000": how the last check of a template stands, in words for sorting and in a mark to see. */
function checkCell(check: CheckSummary | null): LedgerCell {
  if (!check || !check.current) return { value: 'not checked', show: <StateMark thing="check" state="not checked" /> };
  if (check.state === 'running') {
    const said = `${check.done.toLocaleString('en')} of ${check.draws.toLocaleString('en')}`;
    return { value: said, show: <StateMark thing="check" state="running">{said}</StateMark> };
  }
  if (check.state === 'problems') {
    const said = check.problems === 1 ? '1 problem' : `${check.problems} problems`;
    return { value: said, show: <StateMark thing="check" state="problems">{said}</StateMark> };
  }
  return { value: check.state, show: <StateMark thing="check" state={check.state} /> };
}

function lineOf(row: LedgerRow, areas: Readonly<Record<string, string>>, moment: (time: Date) => string): Line {
  return {
    id: row.id,
    href: `/bank/${row.slug}`,
    gone: row.state === 'retired',
    cells: {
      title: row.title,
      area: areas[row.area] ?? (row.area || 'not stated yet'),
      parts: kindsInWords(row.kinds),
      level: row.level,
      marks: row.marks,
      minutes: row.minutes,
      version: row.version,
      forms: row.forms,
      state: { value: row.state, show: <StateMark thing="template" state={row.state} /> },
      check: checkCell(row.check),
      changed: { value: row.changedAt.toISOString(), show: <span className="whitespace-nowrap text-13 text-ink-soft">{moment(row.changedAt)}</span> },
      by: row.changedBy ?? '',
      cautions: row.cautions.join(', '),
      slug: row.slug,
    },
  };
}

/** The bank's ledger: every template with what it asks, its state and how its last check stands. `moment` prints a time. */
export function BankLedger({ rows, areas, moment }: { rows: readonly LedgerRow[]; areas: Readonly<Record<string, string>>; moment: (time: Date) => string }) {
  const empty = (
    <EmptyState title="The bank is empty" says="Write the first template, or bring in template files that you have.">
      <LinkButton href="/bank/files">Bring in files</LinkButton>
      <LinkButton href="/bank/new" look="main">New template</LinkButton>
    </EmptyState>
  );
  const options = { noun: { one: 'template', many: 'templates' }, find: 'Find a title, area or caution', file: 'bank', sort: { key: 'changed', descending: true } };
  return <Ledger label="Bank" columns={columns} rows={rows.map((row) => lineOf(row, areas, moment))} empty={empty} options={options} />;
}
