import { sql } from 'kysely';
import { type Context, holds } from '@/lib/context';
import { isId } from '@/lib/ids';
import { type SchedulableForm, schedulableForms } from '@/lib/exams/queries';
import { done, notFound, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { localDay } from '@/lib/school/times';
import type { SittingState } from '@/lib/sittings/model';
import { maySeeSitting, mayRunSitting } from '@/lib/sittings/relation';
import type { PaperState } from './model';
import { teachesClass } from './relation';
import { allowancesOn, type Enrolled, enrolledOn } from './roster';
import { needSays, noAllowance, type Readiness, readiness, secondsAllowed } from './rules';

export type SittingRow = {
  id: string;
  title: string;
  className: string;
  room: string;
  state: SittingState;
  startsAt: Date;
  candidates: number;
  papers: PaperState;
  papersDrawn: number;
  proctors: string;
  /** The reader is one of its proctors. */
  mine: boolean;
};

/** The ledger of sittings: an instructor's own classes, a proctor's own sittings, all for a registrar. Latest start first. */
export async function sittingLedger(context: Context): Promise<Result<SittingRow[]>> {
  if (!holds(context.actor, 'instructor', 'proctor', 'registrar')) return notFound();
  const rows = await context.db
    .selectFrom('sitting')
    .innerJoin('class', 'class.id', 'sitting.class_id')
    .where(maySeeSitting(context.actor))
    .select((of) => [
      'sitting.id', 'sitting.title', 'class.name as class_name', 'sitting.room', 'sitting.state', 'sitting.starts_at', 'sitting.papers', 'sitting.papers_drawn',
      of.selectFrom('candidate as c').whereRef('c.sitting_id', '=', 'sitting.id').select(sql<number>`count(*)::int`.as('n')).as('candidates'),
      of
        .selectFrom('sitting_proctor as p').innerJoin('account as a', 'a.id', 'p.account_id').whereRef('p.sitting_id', '=', 'sitting.id')
        .select(sql<string>`coalesce(string_agg(a.name, ', ' order by a.sort_name), '')`.as('names')).as('proctors'),
      of.exists(of.selectFrom('sitting as mine').whereRef('mine.id', '=', 'sitting.id').where(runs(context))).as('mine'),
    ])
    .orderBy('sitting.starts_at', 'desc')
    .execute();
  return done(
    rows.map((row) => ({
      id: row.id, title: row.title, className: row.class_name, room: row.room, state: row.state as SittingState, startsAt: row.starts_at,
      candidates: row.candidates ?? 0, papers: row.papers as PaperState, papersDrawn: row.papers_drawn, proctors: row.proctors ?? '', mine: Boolean(row.mine),
    })),
  );
}
const runs = (context: Context) => mayRunSitting(context.actor);

export type PlannedCandidate = {
  id: string;
  name: string;
  learnerNumber: string | null;
  seat: string;
  need: string;
  /** Time allowed [s], rest breaks allowed [s]. */
  secondsAllowed: number;
  restSeconds: number;
  hasPaper: boolean;
  hasEmail: boolean;
  /** State of the latest e-mail about this sitting; null when none was queued. */
  mail: string | null;
  state: string;
};

async function candidatesOf(context: Context, sittingId: string): Promise<(PlannedCandidate & { accountId: string })[]> {
  const rows = await context.db
    .selectFrom('candidate as c')
    .innerJoin('account as a', 'a.id', 'c.account_id')
    .leftJoin('paper as p', 'p.candidate_id', 'c.id')
    .where('c.sitting_id', '=', sittingId)
    .select((of) => [
      'c.id', 'c.account_id', 'a.name', 'a.learner_number', 'a.email', 'c.seat', 'c.need', 'c.seconds_allowed', 'c.rest_seconds_allowed', 'c.state', 'p.candidate_id as paper',
      of
        .selectFrom('mail as m').whereRef('m.sitting_id', '=', 'c.sitting_id').whereRef('m.account_id', '=', 'c.account_id').where('m.kind', '=', 'sitting')
        .select('m.state').orderBy('m.made_at', 'desc').limit(1).as('mail'),
    ])
    .orderBy('a.sort_name')
    .orderBy('c.id')
    .execute();
  return rows.map((row) => ({
    id: row.id, accountId: row.account_id, name: row.name, learnerNumber: row.learner_number, seat: row.seat, need: row.need,
    secondsAllowed: row.seconds_allowed, restSeconds: row.rest_seconds_allowed, hasPaper: row.paper !== null, hasEmail: row.email !== null,
    mail: row.mail, state: row.state,
  }));
}

/** Papers as they are being drawn; null where the sitting is not the reader's. */
export async function paperProgress(context: Context, sittingId: string): Promise<Result<{ papers: PaperState; drawn: number; of: number; says: string }>> {
  if (!isId(sittingId)) return notFound();
  const row = await context.db
    .selectFrom('sitting')
    .where('sitting.id', '=', sittingId)
    .where(maySeeSitting(context.actor))
    .select((of) => [
      'sitting.papers', 'sitting.papers_drawn', 'sitting.papers_says',
      of.selectFrom('candidate as c').whereRef('c.sitting_id', '=', 'sitting.id').select(sql<number>`count(*)::int`.as('n')).as('candidates'),
    ])
    .executeTakeFirst();
  if (!row) return notFound();
  return done({ papers: row.papers as PaperState, drawn: row.papers_drawn, of: row.candidates ?? 0, says: row.papers_says });
}

export type SittingPage = {
  id: string;
  title: string;
  room: string;
  state: SittingState;
  opensAt: Date;
  startsAt: Date;
  latestStartAt: Date;
  /** Time allowed by the form [min]. */
  minutes: number;
  form: { id: string; title: string; number: number; marks: number; questions: number };
  className: string;
  classId: string;
  proctors: { id: string; name: string }[];
  candidates: PlannedCandidate[];
  papers: { state: PaperState; says: string };
  readiness: Readiness[];
  /** Enrolled for the day and not on the list. */
  missing: Enrolled[];
  /** Candidates whose accommodations changed since they were put on the list. */
  changedNeeds: number;
  /** The reader teaches the class; may change the plan; is one of the proctors. */
  teaches: boolean;
  mayPlan: boolean;
  mayRun: boolean;
};

async function visible(context: Context, sittingId: string) {
  if (!isId(sittingId)) return undefined;
  return context.db
    .selectFrom('sitting')
    .innerJoin('class', 'class.id', 'sitting.class_id')
    .innerJoin('form', 'form.id', 'sitting.form_id')
    .where('sitting.id', '=', sittingId)
    .where(maySeeSitting(context.actor))
    .select((of) => [
      'sitting.id', 'sitting.title', 'sitting.room', 'sitting.state', 'sitting.opens_at', 'sitting.starts_at', 'sitting.latest_start_at', 'sitting.minutes',
      'sitting.papers', 'sitting.papers_says', 'sitting.class_id', 'class.name as class_name',
      'form.id as form_id', 'form.title as form_title', 'form.number as form_number', 'form.marks as form_marks',
      of.selectFrom('form_item as i').whereRef('i.form_id', '=', 'form.id').select(sql<number>`count(*)::int`.as('n')).as('questions'),
      teachesClass(context.actor, 'sitting.class_id').as('teaches'),
      runs(context)(of).as('runs'),
    ])
    .executeTakeFirst();
}
type Visible = NonNullable<Awaited<ReturnType<typeof visible>>>;

const twice = (seats: readonly string[]): string[] => [...new Set(seats.filter((seat, place) => seat !== '' && seats.indexOf(seat) !== place))];

async function differences(context: Context, row: Visible, candidates: readonly (PlannedCandidate & { accountId: string })[], day: string) {
  const enrolled = await enrolledOn(context, row.class_id, day);
  const on = new Set(candidates.map((candidate) => candidate.accountId));
  const allowances = await allowancesOn(context, [...on], day);
  const changedNeeds = candidates.filter((candidate) => {
    const now = allowances.get(candidate.accountId) ?? noAllowance;
    return needSays(now) !== candidate.need || secondsAllowed(row.minutes, now) !== candidate.secondsAllowed || now.restMinutes * 60 !== candidate.restSeconds;
  }).length;
  return { missing: enrolled.filter((student) => !on.has(student.accountId)), changedNeeds };
}

/** One sitting as its planning page shows it, with what is ready and what is missing. */
export async function sittingPage(context: Context, sittingId: string): Promise<Result<SittingPage>> {
  const row = await visible(context, sittingId);
  if (!row) return notFound();
  const { settings } = await readSchool(context.db);
  const planned = row.state === 'planned';
  const candidates = await candidatesOf(context, row.id);
  const proctors = await context.db
    .selectFrom('sitting_proctor as p').innerJoin('account as a', 'a.id', 'p.account_id').where('p.sitting_id', '=', row.id)
    .select(['a.id', 'a.name']).orderBy('a.sort_name').execute();
  const changes = planned && row.teaches ? await differences(context, row, candidates, localDay(row.starts_at, settings)) : { missing: [], changedNeeds: 0 };
  const facts = {
    candidates: candidates.length, papers: candidates.filter((candidate) => candidate.hasPaper).length, proctors: proctors.length,
    candidatesPerProctor: settings.candidatesPerProctor, seatless: candidates.filter((candidate) => candidate.seat === '').length,
    sharedSeats: twice(candidates.map((candidate) => candidate.seat)), drawing: row.papers === 'drawing', failed: row.papers === 'failed' ? row.papers_says : '',
  };
  return done({
    id: row.id, title: row.title, room: row.room, state: row.state as SittingState, opensAt: row.opens_at, startsAt: row.starts_at, latestStartAt: row.latest_start_at,
    minutes: row.minutes, className: row.class_name, classId: row.class_id, proctors,
    form: { id: row.form_id, title: row.form_title, number: row.form_number, marks: Number(row.form_marks), questions: row.questions ?? 0 },
    candidates: candidates.map(({ accountId: _, ...candidate }) => candidate),
    papers: { state: row.papers as PaperState, says: row.papers_says },
    readiness: readiness(facts), ...changes,
    teaches: row.teaches, mayPlan: planned && row.teaches, mayRun: Boolean(row.runs),
  });
}

export type PlanOptions = {
  classes: { id: string; name: string; term: string; students: number }[];
  forms: SchedulableForm[];
  proctors: { id: string; name: string }[];
};

/** Accounts that may watch a sitting. */
export const openProctors = (context: Pick<Context, 'db'>) =>
  context.db
    .selectFrom('account as a').innerJoin('account_role as r', 'r.account_id', 'a.id').where('r.role', '=', 'proctor').where('a.state', '<>', 'closed')
    .select(['a.id', 'a.name']).orderBy('a.sort_name').execute();

/** What a new sitting may be made of: the instructor's classes in open terms, forms, proctors. */
export async function planOptions(context: Context): Promise<Result<PlanOptions>> {
  const forms = await schedulableForms(context);
  if (!forms.ok) return forms;
  const classes = await context.db
    .selectFrom('class')
    .innerJoin('term', 'term.id', 'class.term_id')
    .where('term.state', '=', 'open')
    .where(teachesClass(context.actor, 'class.id'))
    .select((of) => [
      'class.id', 'class.name', 'term.name as term',
      of.selectFrom('enrolment as e').whereRef('e.class_id', '=', 'class.id').where('e.until', 'is', null).select(sql<number>`count(*)::int`.as('n')).as('students'),
    ])
    .orderBy('class.name')
    .execute();
  return done({ classes: classes.map((row) => ({ ...row, students: row.students ?? 0 })), forms: forms.value, proctors: await openProctors(context) });
}
