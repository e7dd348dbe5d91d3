import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PublicShell } from '@/components/shell/PublicShell';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import { PageHead } from '@/components/ui/PageHead';
import { appDb } from '@/db/client';
import { config } from '@/lib/config';
import { listSunkMail } from '@/lib/mail/queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';

export const metadata: Metadata = { title: 'Mail of this demo' };
export const dynamic = 'force-dynamic';

const columns = [
  { key: 'subject', title: 'Subject' },
  { key: 'to', title: 'To' },
  { key: 'at', title: 'Received' },
];

export default async function SinkPage() {
  const db = appDb();
  const [mail, school] = await Promise.all([listSunkMail(db, config().kind), readSchool(db)]);
  if (!mail.ok) notFound();
  const rows = mail.value.map(({ id, at, to, subject }) => ({
    id: String(id),
    href: `/mail/${id}`,
    cells: { subject, to, at: { value: at.toISOString(), show: showMoment(at, school.settings) } },
  }));
  return (
    <PublicShell school={school.name}>
      <PageHead title="Mail of this demo" says="What Fullfield has sent. The demo hands its mail to a server on this machine, which delivers nothing." />
      <Ledger
        label="Mail received"
        columns={columns}
        rows={rows}
        empty={<EmptyState title="No mail yet" says="Invite somebody, schedule a sitting or send a grade report: the message will stand here." />}
        options={{ noun: { one: 'message', many: 'messages' }, find: 'Find a person or a subject', file: 'mail' }}
      />
    </PublicShell>
  );
}
