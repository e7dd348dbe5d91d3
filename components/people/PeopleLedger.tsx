import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';
import { LinkButton } from '@/components/ui/LinkButton';
import { StateMark } from '@/components/ui/StateMark';
import type { AccountState } from '@/lib/people/model';

export type PersonLine = {
  id: string;
  sortName: string;
  learnerNumber: string | null;
  email: string | null;
  roles: readonly string[];
  classes: readonly string[];
  state: AccountState;
  /** ISO 8601 for sorting, and as printed. */
  lastSignIn: { at: string; says: string } | null;
};

const columns: LedgerColumn[] = [
  { key: 'name', title: 'Name' },
  { key: 'learnerNumber', title: 'Learner number' },
  { key: 'email', title: 'E-mail' },
  { key: 'roles', title: 'Roles', choose: true },
  { key: 'classes', title: 'Classes' },
  { key: 'state', title: 'Account', rule: true, choose: true },
  { key: 'last', title: 'Signed in', figures: true },
];

const lineOf = (person: PersonLine): LedgerRow => ({
  id: person.id,
  href: `/people/${person.id}`,
  gone: person.state === 'closed',
  cells: {
    name: person.sortName,
    learnerNumber: person.learnerNumber,
    email: person.email,
    roles: person.roles.join(', '),
    classes: person.classes.join(', '),
    state: { value: person.state, show: <StateMark thing="account" state={person.state} /> },
    last: { value: person.lastSignIn?.at ?? '', show: <span className="whitespace-nowrap text-13 text-ink-soft">{person.lastSignIn?.says ?? 'never'}</span> },
  },
});

/** Everybody with an account. */
export function PeopleLedger({ people }: { people: readonly PersonLine[] }) {
  const empty = (
    <EmptyState title="Nobody has an account yet" says="Add people one by one, or bring in a roster from a spreadsheet.">
      <LinkButton href="/people/import">Import a roster</LinkButton>
      <LinkButton href="/people/new" look="main">
        New person
      </LinkButton>
    </EmptyState>
  );
  const options = { noun: { one: 'person', many: 'people' }, find: 'Find a name, number, e-mail or class', file: 'people', sort: { key: 'name' } };
  return <Ledger label="People" columns={columns} rows={people.map(lineOf)} empty={empty} options={options} />;
}
