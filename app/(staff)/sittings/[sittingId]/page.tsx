import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { CandidateList } from '@/components/sittings/plan/CandidateList';
import { PlanPanel } from '@/components/sittings/plan/PlanPanel';
import { QueryProvider } from '@/components/shell/QueryProvider';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { RatingPlate } from '@/components/ui/RatingPlate';
import { StateMark } from '@/components/ui/StateMark';
import { type StateOf } from '@/components/ui/states';
import { pageContext, type SignedIn } from '@/lib/auth/context';
import { type SittingPage, sittingPage } from '@/lib/planning/queries';
import { readSchool } from '@/lib/school/queries';
import { showAppointment, showTime } from '@/lib/school/times';
import {
  addCandidatesAction, cancelSittingAction, drawPapersAgainAction, inviteCandidatesAction, removeCandidateAction, renewNeedsAction, setSeatsAction,
} from '../actions';

type Props = { params: Promise<{ sittingId: string }> };

const load = cache(async (sittingId: string) => {
  const context = await pageContext('instructor', 'proctor', 'registrar');
  const sitting = await sittingPage(context, sittingId);
  if (!sitting.ok) notFound();
  return { context, sitting: sitting.value };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: (await load((await params).sittingId)).sitting.title };
}

const minutes = (seconds: number): string => (seconds === 0 ? '' : `${Math.round(seconds / 6) / 10} min`);
const actions = { invite: inviteCandidatesAction, drawAgain: drawPapersAgainAction, renewNeeds: renewNeedsAction, add: addCandidatesAction, cancel: cancelSittingAction };
const over = ['closed', 'reconciled', 'abandoned'];
const atDesk = ['planned', 'check-in', 'running', 'paused', 'closed'];

function Doors({ sitting, context }: { sitting: SittingPage; context: SignedIn }) {
  const { roles } = context.actor;
  return (
    <>
      {sitting.mayPlan && <LinkButton href={`/sittings/${sitting.id}/plan`}>Change the plan</LinkButton>}
      {roles.has('instructor') && sitting.teaches && over.includes(sitting.state) && <LinkButton href={`/marking/${sitting.id}`} look={sitting.mayRun ? 'plain' : 'main'}>Go to the marking</LinkButton>}
      {roles.has('registrar') && over.includes(sitting.state) && <LinkButton href={`/records/${sitting.id}`}>Go to the records</LinkButton>}
      {sitting.mayRun && atDesk.includes(sitting.state) && <LinkButton href={`/sittings/${sitting.id}/board`} look="main">Open the board</LinkButton>}
    </>
  );
}

export default async function SittingPlanPage({ params }: Props) {
  const { context, sitting } = await load((await params).sittingId);
  const { settings } = await readSchool(context.db);
  const cells = [
    { label: 'Form', value: `${sitting.form.title}, form ${sitting.form.number}` },
    { label: 'Questions', value: `${sitting.form.questions}, ${sitting.form.marks} marks` },
    { label: 'Time allowed', value: `${sitting.minutes} min` },
    { label: 'Class', value: sitting.className },
    { label: 'Room', value: sitting.room },
    { label: 'Check-in opens', value: showTime(sitting.opensAt, settings) },
    { label: 'Latest start', value: showTime(sitting.latestStartAt, settings) },
    { label: 'Proctors', value: sitting.proctors.map((proctor) => proctor.name).join(', ') || 'none' },
  ];
  const candidates = sitting.candidates.map(({ secondsAllowed, restSeconds, mail, state, ...candidate }) => ({
    ...candidate, time: minutes(secondsAllowed), rest: minutes(restSeconds), mail: mail as StateOf<'e-mail'> | null, state: state as StateOf<'candidate'>,
  }));
  const plan = {
    id: sitting.id, title: sitting.title, papers: sitting.papers.state, drawn: sitting.candidates.filter((candidate) => candidate.hasPaper).length, candidates: candidates.length,
    withoutAddress: candidates.filter((candidate) => !candidate.hasEmail).length, readiness: sitting.readiness, missing: sitting.missing, changedNeeds: sitting.changedNeeds,
    mayPlan: sitting.mayPlan, mayCancel: sitting.teaches && (sitting.state === 'planned' || sitting.state === 'check-in'),
  };
  return (
    <QueryProvider>
      <PageHead title={sitting.title} says={<><StateMark thing="sitting" state={sitting.state} /> · {showAppointment(sitting.startsAt, settings)}</>} back={{ href: '/sittings', label: 'Sittings' }}>
        <Doors sitting={sitting} context={context} />
      </PageHead>
      <RatingPlate kind="record" label="The sitting" cells={cells} columns={4} />
      <div className="beside mt-8">
        <CandidateList sittingId={sitting.id} candidates={candidates} mayPlan={sitting.mayPlan} saveSeats={setSeatsAction} remove={removeCandidateAction} />
        {(sitting.state === 'planned' || plan.mayCancel) && <PlanPanel plan={plan} actions={actions} />}
      </div>
    </QueryProvider>
  );
}
