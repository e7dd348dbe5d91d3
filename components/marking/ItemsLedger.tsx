import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import type { ItemRow } from '@/lib/results/marking-queries';

const columns: LedgerColumn[] = [
  { key: 'item', title: 'Part' },
  { key: 'share', title: 'Mean %', figures: 0, rule: true },
  { key: 'of', title: 'Marks', figures: true },
  { key: 'correct', title: 'Right', figures: 0, rule: true },
  { key: 'carried', title: 'Carried', figures: 0 },
  { key: 'misstep', title: 'Misstep', figures: 0 },
  { key: 'wrong', title: 'Wrong', figures: 0 },
  { key: 'blank', title: 'Blank', figures: 0 },
  { key: 'other', title: 'Not read or for the marker', figures: 0, hidden: true },
  { key: 'missteps', title: 'Commonest missteps', rule: true },
];

function rowOf({ question, part, of, meanShare, verdicts, missteps }: ItemRow): LedgerRow {
  const said = missteps.map((misstep) => `${misstep.count} × ${misstep.says.replace(/^What went wrong: /, '').replace(/\.$/, '')}`);
  return {
    id: `${question} ${part}`,
    cells: {
      item: `${question} ${part}`, share: Math.round(meanShare * 100), of,
      correct: verdicts.correct ?? 0, carried: verdicts.carried ?? 0, misstep: verdicts.misstep ?? 0, wrong: verdicts.wrong ?? 0, blank: verdicts.blank ?? 0,
      other: (verdicts.unread ?? 0) + (verdicts['for-marker'] ?? 0),
      missteps: said.length === 0 ? null : { value: said.join('; '), show: <span className="block py-2">{said.map((line) => <span key={line} className="sub">{line}</span>)}</span> },
    },
  };
}

/** How each part came out over all candidates. */
export function ItemsLedger({ items }: { items: readonly ItemRow[] }) {
  return (
    <Ledger
      label="Parts" columns={columns} rows={items.map(rowOf)} empty={<EmptyState title="Nothing is marked" says="Each part stands here once papers are marked." />}
      options={{ noun: { one: 'part', many: 'parts' }, file: 'parts', bare: true }}
    />
  );
}
