import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { SittingForm } from '@/components/sittings/plan/SittingForm';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { planOptions, sittingPage } from '@/lib/planning/queries';
import { readSchool } from '@/lib/school/queries';
import { toLocal, zoneName } from '@/lib/school/times';
import { changeSittingAction } from '../../actions';

export const metadata: Metadata = { title: 'Change the plan' };

export default async function ChangePlanPage({ params }: { params: Promise<{ sittingId: string }> }) {
  const context = await pageContext('instructor');
  const sitting = await sittingPage(context, (await params).sittingId);
  const options = await planOptions(context);
  if (!sitting.ok || !sitting.value.mayPlan || !options.ok) notFound();
  const { settings } = await readSchool(context.db);
  const { id, title, room, form, classId, proctors, opensAt, startsAt, latestStartAt } = sitting.value;
  const values = {
    formId: form.id, classId, title, room, proctors: proctors.map((proctor) => proctor.id),
    opensAt: toLocal(opensAt, settings), startsAt: toLocal(startsAt, settings), latestStartAt: toLocal(latestStartAt, settings),
  };
  return (
    <>
      <PageHead title="Change the plan" says={`${title}. Candidates get the accommodations of the new day; invite them again so that they know.`} back={{ href: `/sittings/${id}`, label: title }} />
      <SittingForm mode="change" choices={{ ...options.value, zone: zoneName(startsAt, settings) }} values={values} send={changeSittingAction.bind(null, id)} back={`/sittings/${id}`} />
    </>
  );
}
