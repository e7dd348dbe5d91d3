import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { Sign } from '@/components/ui/Sign';
import type { RecordRow } from '@/lib/results/records-queries';

const columns: LedgerColumn[] = [
  { key: 'title', title: 'Sitting' },
  { key: 'exam', title: 'Exam', choose: true },
  { key: 'class', title: 'Class', choose: true },
  { key: 'sat', title: 'Sat', figures: true },
  { key: 'candidates', title: 'Candidates', figures: 0, rule: true },
  { key: 'released', title: 'Released', figures: 0 },
  { key: 'sealed', title: 'Sealed', figures: 0 },
  { key: 'reports', title: 'Reports', figures: 0 },
  { key: 'next', title: 'To do', rule: true, choose: true },
];

function next({ facts, reports }: RecordRow): { says: string; done: boolean } {
  const { states, candidates } = facts;
  if (states.sealed + states.amended === candidates && candidates > 0) return reports < candidates ? { says: 'issue reports', done: false } : { says: 'nothing', done: true };
  if (states.released + states.sealed === candidates && candidates > 0) return { says: 'seal', done: false };
  return { says: 'with the instructor', done: false };
}

function rowOf(row: RecordRow, moment: (time: Date) => string): LedgerRow {
  const { states } = row.facts;
  const todo = next(row);
  return {
    id: row.id, href: `/records/${row.id}`,
    cells: {
      title: row.title, exam: row.exam, class: row.className, sat: { value: row.startsAt.toISOString(), show: <span className="whitespace-nowrap">{moment(row.startsAt)}</span> },
      candidates: row.facts.candidates, released: states.released, sealed: states.sealed + states.amended, reports: row.reports,
      next: { value: todo.says, show: <Sign shape={todo.done ? 'check' : todo.says === 'with the instructor' ? 'hourglass' : 'sq-bang'} tone={todo.done ? 'ok' : todo.says === 'with the instructor' ? 'none' : 'wait'}>{todo.says}</Sign> },
    },
  };
}

/** Sittings that have results. */
export function RecordsLedger({ sittings, moment }: { sittings: readonly RecordRow[]; moment: (time: Date) => string }) {
  return (
    <Ledger
      label="Sittings with results" columns={columns} rows={sittings.map((row) => rowOf(row, moment))}
      empty={<EmptyState title="No results yet" says="A sitting stands here once its proctor has closed it." />}
      options={{ noun: { one: 'sitting', many: 'sittings' }, find: 'Find a sitting, exam or class', file: 'records', sort: { key: 'sat', descending: true } }}
    />
  );
}
