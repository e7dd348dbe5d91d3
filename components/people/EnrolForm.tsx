'use client';

import { useRouter } from 'next/navigation';
import { useMemo } from 'react';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import type { BulkAction, LedgerColumn } from '@/components/ui/ledger/model';
import type { Result } from '@/lib/result';

type Props = { className: string; students: readonly { id: string; name: string; detail: string }[]; enrol: (ids: string[]) => Promise<Result<{ enrolled: number }>> };

const columns: LedgerColumn[] = [
  { key: 'name', title: 'Name' },
  { key: 'detail', title: 'Learner number or e-mail' },
];

/** Students who are not in the class, to choose from. */
export function EnrolForm({ className, students, enrol }: Props) {
  const router = useRouter();
  const rows = useMemo(() => students.map((one) => ({ id: one.id, cells: { name: one.name, detail: one.detail } })), [students]);
  const bulk: BulkAction[] = [
    {
      label: `Enrol in ${className}`,
      run: async (ids) => {
        const done = await enrol(ids);
        if (done.ok) router.refresh();
        return done.ok ? { ok: true, says: `${done.value.enrolled} enrolled in ${className}.` } : done;
      },
    },
  ];
  const empty = <EmptyState title="Every student is in the class" says="New students are added under People." />;
  return <Ledger label="Students who are not in the class" columns={columns} rows={rows} empty={empty} bulk={bulk} options={{ noun: { one: 'student', many: 'students' }, file: 'students', pageSize: 25, sort: { key: 'name' } }} />;
}
