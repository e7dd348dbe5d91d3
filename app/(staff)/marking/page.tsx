import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { MarkingLedger } from '@/components/marking/MarkingLedger';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { markingLedger } from '@/lib/results/marking-queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';

export const metadata: Metadata = { title: 'Marking' };

export default async function MarkingPage() {
  const context = await pageContext('instructor');
  const sittings = await markingLedger(context);
  if (!sittings.ok) notFound();
  const { settings } = await readSchool(context.db);
  return (
    <>
      <PageHead title="Marking" says="Sittings of your classes that are over: what is marked, what waits for you, what is released." />
      <MarkingLedger sittings={sittings.value} moment={(time) => showMoment(time, settings)} />
    </>
  );
}
