'use client';

import { useRouter } from 'next/navigation';
import { useMemo, useState } from 'react';
import { SlipSheet } from '@/components/people/SlipSheet';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { BulkAction, LedgerColumn } from '@/components/ui/ledger/model';
import { StateMark } from '@/components/ui/StateMark';
import type { AccountState } from '@/lib/people/model';
import type { Result } from '@/lib/result';

export type MemberLine = { accountId: string; sortName: string; learnerNumber: string | null; email: string | null; state: AccountState; since: string; until: string | null };
export type PrintedSlip = { accountId: string; name: string; learnerNumber: string; code: string; until: string };
export type SlipBatch = { slips: PrintedSlip[]; left: { accountId: string; name: string; why: string }[] };

type Props = {
  school: string;
  className: string;
  members: readonly MemberLine[];
  makeSlips: (ids: string[]) => Promise<Result<SlipBatch>>;
  takeOut: (ids: string[]) => Promise<Result<{ ended: number }>>;
};

const columns: LedgerColumn[] = [
  { key: 'name', title: 'Name' },
  { key: 'learnerNumber', title: 'Learner number' },
  { key: 'email', title: 'E-mail' },
  { key: 'since', title: 'From', rule: true },
  { key: 'until', title: 'Until' },
  { key: 'state', title: 'Account', rule: true, choose: true },
];

/** The students of a class, with slips for those chosen. A code is shown once: printed here, or made anew. */
export function MembersLedger({ school, className, members, makeSlips, takeOut }: Props) {
  const router = useRouter();
  const [batch, setBatch] = useState<SlipBatch | null>(null);
  const rows = useMemo(
    () =>
      members.map((member) => ({
        id: member.accountId,
        href: `/people/${member.accountId}`,
        gone: member.until !== null || member.state === 'closed',
        cells: {
          name: member.sortName,
          learnerNumber: member.learnerNumber,
          email: member.email,
          since: member.since,
          until: member.until,
          state: { value: member.state, show: <StateMark thing="account" state={member.state} /> },
        },
      })),
    [members],
  );
  const bulk: BulkAction[] = [
    {
      label: 'Make slips',
      run: async (ids) => {
        const made = await makeSlips(ids);
        if (made.ok) setBatch(made.value);
        return made.ok ? undefined : made;
      },
    },
    {
      label: 'Take out of the class',
      look: 'stop',
      confirm: { title: `Take the chosen students out of ${className}?`, says: 'Their enrolment ends yesterday, so that today they are not in the class. What they sat stays on record.', verb: 'Take out' },
      run: async (ids) => {
        const ended = await takeOut(ids);
        if (ended.ok) router.refresh();
        return ended.ok ? { ok: true, says: `${ended.value.ended} taken out of the class.` } : ended;
      },
    },
  ];
  if (batch) return <SlipSheet school={school} batch={batch} onDone={() => setBatch(null)} />;
  const empty = <EmptyState title="Nobody is enrolled" says="Choose students below, or bring in a roster." />;
  return <Ledger label="Students" columns={columns} rows={rows} empty={empty} bulk={bulk} options={{ noun: { one: 'student', many: 'students' }, file: `class ${className}`, sort: { key: 'name' } }} />;
}
