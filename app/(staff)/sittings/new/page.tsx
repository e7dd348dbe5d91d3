import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { readClock } from '@/db/clock';
import { SittingForm } from '@/components/sittings/plan/SittingForm';
import { EmptyState } from '@/components/ui/EmptyState';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { planOptions } from '@/lib/planning/queries';
import { readSchool } from '@/lib/school/queries';
import { toLocal, zoneName } from '@/lib/school/times';
import { planSittingAction } from '../actions';

export const metadata: Metadata = { title: 'Schedule a sitting' };
const day = 86_400_000;

export default async function NewSittingPage({ searchParams }: { searchParams: Promise<{ form?: string | string[] }> }) {
  const context = await pageContext('instructor');
  const options = await planOptions(context);
  if (!options.ok) notFound();
  const { settings } = await readSchool(context.db);
  const asked = (await searchParams).form;
  const form = options.value.forms.find((one) => one.id === asked);
  const now = await readClock(context.db);
  const date = toLocal(new Date(now.getTime() + 7 * day), settings).slice(0, 10);
  const values = { formId: form?.id ?? '', classId: '', title: form?.title ?? '', room: '', opensAt: `${date}T08:30`, startsAt: `${date}T09:00`, latestStartAt: `${date}T09:30`, proctors: [] };
  const head = <PageHead title="Schedule a sitting" says="A form for a class, in a room, at a time. Papers are drawn by themselves once it is scheduled." back={{ href: '/sittings', label: 'Sittings' }} />;
  if (options.value.forms.length === 0) {
    return (
      <>
        {head}
        <EmptyState title="No form to schedule" says="An exam that a second instructor has approved gives a form.">
          <LinkButton href="/exams" look="main">Go to the exams</LinkButton>
        </EmptyState>
      </>
    );
  }
  if (options.value.classes.length === 0) return <>{head}<EmptyState title="No class of yours" says="You can schedule for classes that you teach in an open term. A registrar puts you down as a class’s instructor." /></>;
  return (
    <>
      {head}
      <SittingForm mode="new" choices={{ ...options.value, zone: zoneName(now, settings) }} values={values} send={planSittingAction} back="/sittings" />
    </>
  );
}
