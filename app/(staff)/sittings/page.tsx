import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { SittingLedger } from '@/components/sittings/plan/SittingLedger';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { sittingLedger } from '@/lib/planning/queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';

export const metadata: Metadata = { title: 'Sittings' };

export default async function SittingsPage() {
  const context = await pageContext('instructor', 'proctor', 'registrar');
  const sittings = await sittingLedger(context);
  if (!sittings.ok) notFound();
  const { settings } = await readSchool(context.db);
  const mayPlan = context.actor.roles.has('instructor');
  return (
    <>
      <PageHead title="Sittings" says="Each occasion on which a form is written: class, room, time, proctors and candidates.">
        {mayPlan && <LinkButton href="/sittings/new" look="main">Schedule a sitting</LinkButton>}
      </PageHead>
      <SittingLedger sittings={sittings.value} moment={(time) => showMoment(time, settings)} mayPlan={mayPlan} />
    </>
  );
}
