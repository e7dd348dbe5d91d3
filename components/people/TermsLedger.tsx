import { ActionButton } from '@/components/forms/ActionButton';
import { TermForm } from '@/components/people/TermForm';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn } from '@/components/ui/ledger/model';
import { Sign } from '@/components/ui/Sign';
import type { TermInput, TermRow } from '@/lib/classes/model';
import type { Result } from '@/lib/result';

type Props = {
  terms: readonly TermRow[];
  /** Prints a day. */
  date: (day: string) => string;
  save: (id: string | null, input: TermInput) => Promise<Result<{ id: string }>>;
  setState: (id: string, state: 'open' | 'ended') => Promise<Result<null>>;
};

const columns: LedgerColumn[] = [
  { key: 'name', title: 'Term' },
  { key: 'starts', title: 'First day' },
  { key: 'ends', title: 'Last day' },
  { key: 'classes', title: 'Classes', figures: 0, rule: true },
  { key: 'students', title: 'Students', figures: 0 },
  { key: 'state', title: 'State', rule: true },
  { key: 'do', title: 'Change' },
];

function Change({ term, save, setState }: { term: TermRow } & Pick<Props, 'save' | 'setState'>) {
  const ends = { title: `End the term ${term.name}?`, says: 'Its classes leave the lists of what goes on. Everything stays on record, and you can open it again.', verb: 'End the term', look: 'main' as const };
  return (
    <span className="flex flex-wrap gap-2 py-1">
      <TermForm dense label="Change" title={term.name} values={{ name: term.name, startsOn: term.startsOn, endsOn: term.endsOn }} save={save.bind(null, term.id)} />
      {term.state === 'open' ? (
        <ActionButton dense label="End" run={setState.bind(null, term.id, 'ended')} confirm={ends} />
      ) : (
        <ActionButton dense label="Open" run={setState.bind(null, term.id, 'open')} />
      )}
    </span>
  );
}

/** Every term with its days and how much goes on in it. */
export function TermsLedger({ terms, date, save, setState }: Props) {
  const rows = terms.map((term) => ({
    id: term.id,
    gone: term.state === 'ended',
    cells: {
      name: term.name,
      starts: { value: term.startsOn, show: date(term.startsOn) },
      ends: { value: term.endsOn, show: date(term.endsOn) },
      classes: term.classes,
      students: term.students,
      state: { value: term.state, show: term.state === 'open' ? <Sign shape="check" tone="ok">open</Sign> : <Sign shape="cross" tone="none">ended</Sign> },
      do: { value: null, show: <Change term={term} save={save} setState={setState} /> },
    },
  }));
  const empty = <EmptyState title="No term yet" says="A term has a name, a first and a last day; classes belong to it." />;
  return <Ledger label="Terms" columns={columns} rows={rows} empty={empty} options={{ noun: { one: 'term', many: 'terms' }, file: 'terms', bare: true }} />;
}
