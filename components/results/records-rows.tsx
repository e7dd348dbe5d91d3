import { ActionButton } from '@/components/forms/ActionButton';
import type { LedgerCell, LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { LinkButton } from '@/components/ui/LinkButton';
import { StateMark } from '@/components/ui/StateMark';
import type { StateOf } from '@/components/ui/states';
import type { Result } from '@/lib/result';
import type { RecordLine, RecordPage } from '@/lib/results/records-queries';
import { OutcomeMark, ResultMark } from './OutcomeMark';

export type SendAgain = (mailId: string) => Promise<Result<null>>;

/** Columns of a class's results: a section each, then totals, outcome, state, report. */
export const recordColumns = (page: Pick<RecordPage, 'sections'>, decimals: number): LedgerColumn[] => [
  { key: 'name', title: 'Candidate' },
  { key: 'number', title: 'Number' },
  ...page.sections.map((section, at): LedgerColumn => ({ key: `section-${at}`, title: `${section.title} /${section.of}`, figures: decimals, ...(at === 0 ? { rule: true } : {}) })),
  { key: 'total', title: 'Total', figures: decimals, rule: true },
  { key: 'percent', title: 'Percent', figures: decimals, hidden: true },
  { key: 'outcome', title: 'Outcome', rule: true, choose: true },
  { key: 'state', title: 'Result', choose: true },
  { key: 'report', title: 'Report', rule: true },
  { key: 'mail', title: 'E-mail' },
];

function mailCell({ report, hasEmail }: RecordLine, again: SendAgain | null): LedgerCell {
  if (!report) return null;
  if (!report.mail) return { value: hasEmail ? 'not sent' : 'no address', show: <span className="whitespace-nowrap text-13 text-ink-soft">{hasEmail ? 'not sent' : 'no address'}</span> };
  const { id, state, says } = report.mail;
  const stuck = state === 'failed' || state === 'unsure';
  return {
    value: state,
    show: (
      <span className="flex flex-wrap items-center gap-2 py-1">
        <span title={says || undefined}><StateMark thing="e-mail" state={state as StateOf<'e-mail'>} small /></span>
        {stuck && again && <ActionButton dense label="Send again" run={again.bind(null, id)} />}
        {stuck && says && <span className="sub">{says}</span>}
      </span>
    ),
  };
}

function reportCell({ report }: RecordLine): LedgerCell {
  if (!report) return null;
  const value = report.current ? `issue ${report.issue}` : `issue ${report.issue}, superseded`;
  return { value, show: <LinkButton size="dense" className="whitespace-nowrap" document href={`/api/reports/${report.id}`}>PDF, {value}</LinkButton> };
}

/** One candidate's line. What was not sat has no figures, never zeros. */
export function recordRow(line: RecordLine, sections: number, again: SendAgain | null): LedgerRow {
  const { result } = line;
  const sat = result !== null && result.outcome !== 'absent';
  const figures = Object.fromEntries(Array.from({ length: sections }, (_, at) => [`section-${at}`, sat ? (result.sections[at]?.awarded ?? null) : null]));
  return {
    id: line.id, gone: result?.outcome === 'absent',
    cells: {
      name: line.name, number: { value: line.learnerNumber, show: <span className="num whitespace-nowrap text-13">{line.learnerNumber}</span> }, ...figures,
      total: sat ? result.total : null, percent: sat ? result.percent : null,
      outcome: result ? { value: result.withheld ? 'withheld' : result.outcome, show: <OutcomeMark outcome={result.outcome} withheld={result.withheld} small /> } : 'not marked',
      state: result ? { value: result.withheld ? 'withheld' : result.state, show: <ResultMark state={result.state} withheld={result.withheld} small /> } : null,
      report: reportCell(line), mail: mailCell(line, again),
    },
  };
}

const mean = (values: readonly number[], decimals: number): number | null =>
  values.length === 0 ? null : Math.round((values.reduce((sum, value) => sum + value, 0) / values.length) * 10 ** decimals) / 10 ** decimals;

/** The totals row: means of those who sat, and how many came out how. */
export function recordTotal(page: Pick<RecordPage, 'sections' | 'lines'>, decimals: number): Record<string, LedgerCell> {
  const sat = page.lines.flatMap(({ result }) => (result && result.outcome !== 'absent' ? [result] : []));
  const passed = sat.filter((result) => result.outcome === 'pass' && !result.withheld).length;
  const failed = sat.filter((result) => result.outcome === 'not passed' && !result.withheld).length;
  const says = [`${passed} pass`, `${failed} not passed`, ...(sat.length > passed + failed ? [`${sat.length - passed - failed} open`] : [])].join(' · ');
  return {
    name: `Mean of ${sat.length} who sat`,
    ...Object.fromEntries(page.sections.map((_, at) => [`section-${at}`, mean(sat.map((result) => result.sections[at]?.awarded ?? 0), decimals)])),
    total: mean(sat.map((result) => result.total), decimals), percent: mean(sat.map((result) => result.percent), decimals), outcome: says,
  };
}
