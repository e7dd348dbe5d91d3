import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { LetterSheet } from '@/components/mail/LetterSheet';
import { PublicShell } from '@/components/shell/PublicShell';
import { PageHead } from '@/components/ui/PageHead';
import { appDb } from '@/db/client';
import { config } from '@/lib/config';
import { readSunkMail } from '@/lib/mail/queries';
import { readSchool } from '@/lib/school/queries';
import { showSecond, showDate } from '@/lib/school/times';

export const metadata: Metadata = { title: 'A message' };
export const dynamic = 'force-dynamic';

export default async function LetterPage({ params }: { params: Promise<{ mailId: string }> }) {
  const db = appDb();
  const [letter, school] = await Promise.all([readSunkMail(db, config().kind, Number((await params).mailId)), readSchool(db)]);
  if (!letter.ok) notFound();
  const { id, at, subject, from, to, text, messageId, files } = letter.value;
  const received = `${showDate(at, school.settings)}, ${showSecond(at, school.settings)}`;
  return (
    <PublicShell school={school.name}>
      <PageHead title={subject || 'No subject'} back={{ href: '/mail', label: 'Mail of this demo' }} />
      <LetterSheet
        head={[
          { label: 'From', value: from },
          { label: 'To', value: to },
          { label: 'Received', value: received },
          { label: 'Message-ID', value: messageId },
        ]}
        text={text}
        home={config().publicUrl}
        files={files.map((file, place) => ({ ...file, href: `/mail/${id}/files/${place}` }))}
      />
    </PublicShell>
  );
}
