'use client';

import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { BulkAction, LedgerColumn, LedgerOptions, LedgerRow } from '@/components/ui/ledger/model';
import { StateMark } from '@/components/ui/StateMark';
import type { StateOf } from '@/components/ui/states';
import { Section } from './Section';

const columns: LedgerColumn[] = [
  { key: 'candidate', title: 'Candidate' },
  { key: 'number', title: 'Number' },
  { key: 'motors', title: 'Motors /40', figures: 1, rule: true },
  { key: 'total', title: 'Total', figures: true },
  { key: 'outcome', title: 'Outcome', rule: true, choose: true },
];

const people: [string, number | null, number | null, StateOf<'outcome'>][] = [
  ['Abara, Adaeze', 34.5, 79.5, 'pass'],
  ['Amari, Hana', 30, 70, 'second marker'],
  ['Castellan, Fabio', 22.5, 55, 'not passed'],
  ['Dufresne, Gaëlle', 38.5, 93.5, 'pass'],
  ['Jessop, Zara', 29, 77.25, 'withheld'],
  ['Kowal, Ulrike', null, null, 'absent'],
];

const rows: LedgerRow[] = people.map(([candidate, motors, total, outcome], at) => ({
  id: `c${at}`,
  href: `/parts?candidate=c${at}`,
  gone: outcome === 'absent',
  cells: {
    candidate,
    number: `KR-204${10 + at}`,
    motors,
    total,
    outcome: { value: outcome, show: <StateMark thing="outcome" state={outcome} /> },
  },
}));

const bulk: BulkAction[] = [
  { label: 'Release', run: (ids) => ({ ok: true, says: `${ids.length} released.` }) },
  {
    label: 'Withhold',
    look: 'stop',
    confirm: { title: 'Withhold the selected results?', says: 'Nobody sees them until they are released.', verb: 'Withhold' },
    run: () => ({ ok: false, says: 'A sealed result cannot be withheld: amend it.' }),
  },
];

const options: LedgerOptions = {
  noun: { one: 'candidate', many: 'candidates' },
  find: 'Find a name or number',
  total: { candidate: 'Mean of 5 who sat', motors: 30.9, total: 75.05 },
  sort: { key: 'candidate' },
};

const many: LedgerRow[] = Array.from({ length: 450 }, (_, at) => ({
  id: `n${at}`,
  cells: { seed: `check-${at}`, key: Math.round(60000 + ((at * 7919) % 40000)) / 1000 },
}));
const manyColumns: LedgerColumn[] = [
  { key: 'seed', title: 'Seed' },
  { key: 'key', title: 'Key, A', figures: true, rule: true },
];
const manyOptions: LedgerOptions = { noun: { one: 'draw', many: 'draws' }, pageSize: 10 };

export function LedgerParts() {
  const empty = <EmptyState title="No results yet" says="Close the sitting first." />;
  return (
    <Section title="Ledger">
      <Ledger label="Results" columns={columns} rows={rows} empty={empty} bulk={bulk} options={options} />
      <Ledger label="Draws" columns={manyColumns} rows={many} empty={empty} options={manyOptions} />
    </Section>
  );
}
