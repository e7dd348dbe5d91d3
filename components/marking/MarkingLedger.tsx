import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { Sign } from '@/components/ui/Sign';
import type { MarkingRow } from '@/lib/results/marking-queries';

const columns: LedgerColumn[] = [
  { key: 'title', title: 'Sitting' },
  { key: 'class', title: 'Class', choose: true },
  { key: 'sat', title: 'Sat', figures: true },
  { key: 'candidates', title: 'Candidates', figures: 0, rule: true },
  { key: 'mean', title: 'Mean', figures: 1 },
  { key: 'of', title: 'Of', figures: true },
  { key: 'todo', title: 'To do', rule: true },
  { key: 'released', title: 'Released', figures: 0 },
];

/** The next thing that a person has to do, in words. */
function todo({ facts }: MarkingRow): { says: string; done: boolean } {
  const { states, candidates } = facts;
  if (facts.unmarked > 0) return { says: `${facts.unmarked} being marked`, done: false };
  if (facts.forMarker > 0) return { says: `${facts.forMarker} for the marker`, done: false };
  if (facts.claims > 0) return { says: `${facts.claims} came after the end`, done: false };
  if (states.provisional > 0) return { says: 'moderate', done: false };
  if (states.moderated > facts.withheld) return { says: 'release', done: false };
  if (states.moderated > 0) return { says: `${facts.withheld} withheld`, done: false };
  return { says: candidates > 0 && states.sealed === candidates ? 'sealed' : 'nothing', done: true };
}

function rowOf(row: MarkingRow, moment: (time: Date) => string): LedgerRow {
  const next = todo(row);
  const { states } = row.facts;
  return {
    id: row.id, href: `/marking/${row.id}`,
    cells: {
      title: row.title, class: row.className, sat: { value: row.startsAt.toISOString(), show: <span className="whitespace-nowrap">{moment(row.startsAt)}</span> },
      candidates: row.facts.candidates, mean: row.facts.mean === null ? null : Math.round(row.facts.mean * 10) / 10, of: row.marks,
      todo: { value: next.says, show: <Sign shape={next.done ? 'check' : 'sq-bang'} tone={next.done ? 'ok' : 'wait'}>{next.says}</Sign> },
      released: states.released + states.sealed + states.amended,
    },
  };
}

/** Sittings that are over, with what is still to do before their results are out. */
export function MarkingLedger({ sittings, moment }: { sittings: readonly MarkingRow[]; moment: (time: Date) => string }) {
  const empty = <EmptyState title="Nothing to mark" says="A sitting of your classes stands here as soon as its proctor has closed it. Marking then runs by itself." />;
  return (
    <Ledger
      label="Sittings to mark" columns={columns} rows={sittings.map((row) => rowOf(row, moment))} empty={empty}
      options={{ noun: { one: 'sitting', many: 'sittings' }, find: 'Find a title or class', file: 'marking', sort: { key: 'sat', descending: true } }}
    />
  );
}
