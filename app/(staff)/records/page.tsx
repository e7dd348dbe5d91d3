import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { RecordsLedger } from '@/components/results/RecordsLedger';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { recordsLedger } from '@/lib/results/records-queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';

export const metadata: Metadata = { title: 'Records' };

export default async function RecordsPage() {
  const context = await pageContext('registrar', 'instructor');
  const sittings = await recordsLedger(context);
  if (!sittings.ok) notFound();
  const { settings } = await readSchool(context.db);
  return (
    <>
      <PageHead title="Records" says="Results by sitting: released by the instructor, sealed by the registrar, reported and sent." />
      <RecordsLedger sittings={sittings.value} moment={(time) => showMoment(time, settings)} />
    </>
  );
}
