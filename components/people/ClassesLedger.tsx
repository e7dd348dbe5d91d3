import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn } from '@/components/ui/ledger/model';
import type { ClassRow } from '@/lib/classes/model';

const columns: LedgerColumn[] = [
  { key: 'name', title: 'Class' },
  { key: 'title', title: 'Title' },
  { key: 'term', title: 'Term', choose: true },
  { key: 'instructors', title: 'Instructors' },
  { key: 'students', title: 'Students', figures: 0, rule: true },
];

/** Every class; those of ended terms are set back. */
export function ClassesLedger({ classes }: { classes: readonly ClassRow[] }) {
  const rows = classes.map((one) => ({
    id: one.id,
    href: `/people/classes/${one.id}`,
    gone: one.termState === 'ended',
    cells: { name: one.name, title: one.title, term: one.term, instructors: one.instructors.join('; '), students: one.students },
  }));
  const empty = <EmptyState title="No class yet" says="Make a term first, then its classes; or let a roster make them." />;
  return <Ledger label="Classes" columns={columns} rows={rows} empty={empty} options={{ noun: { one: 'class', many: 'classes' }, find: 'Find a class, title or instructor', file: 'classes' }} />;
}
