import { randomBytes } from 'node:crypto';
import { readClock } from '@/db/clock';
import { record } from '@/lib/audit/commands';
import { nextCandidate } from '@/lib/candidates/rules';
import { lockCandidates, storeClock, toClock } from '@/lib/candidates/store';
import { accountId, type Context, holds, inTransaction } from '@/lib/context';
import { done, notFound, refuse, type Result } from '@/lib/result';
import type { School } from '@/lib/school/model';
import { readSchool } from '@/lib/school/queries';
import { fromLocal, localDay } from '@/lib/school/times';
import type { SittingState } from '@/lib/sittings/model';
import { nextSitting } from '@/lib/sittings/rules';
import { noteSitting } from '@/lib/sittings/timeline';
import { type NewSitting, newSitting, type SittingChange, sittingChange } from './model';
import { openProctors } from './queries';
import { teachesClass } from './relation';
import { allowancesOn, enrolledOn } from './roster';
import { defaultSeat } from './rules';
import { type Planner, queuePapers, timeColumns, withPlanned, withTaught } from './store';

type Times = { opensAt: Date; startsAt: Date; latestStartAt: Date };

function readTimes(input: Pick<SittingChange, 'opensAt' | 'startsAt' | 'latestStartAt'>, school: School, now: Date): Result<Times> {
  const [opensAt, startsAt, latestStartAt] = [input.opensAt, input.startsAt, input.latestStartAt].map((text) => fromLocal(text, school.settings));
  if (!opensAt) return refuse('no-time', 'This is no date and time.', 'opensAt');
  if (!startsAt) return refuse('no-time', 'This is no date and time.', 'startsAt');
  if (!latestStartAt) return refuse('no-time', 'This is no date and time.', 'latestStartAt');
  if (latestStartAt <= now) return refuse('past', 'This time is over already: give one ahead.', 'latestStartAt');
  return done({ opensAt, startsAt, latestStartAt });
}

/** The chosen proctors, if every one may watch this sitting: an open account with the role, and no candidate of it. */
async function readProctors(planner: Planner, chosen: readonly string[], candidates: ReadonlySet<string>): Promise<Result<string[]>> {
  const open = new Map((await openProctors(planner)).map((proctor) => [proctor.id, proctor.name]));
  const ids = [...new Set(chosen)];
  if (ids.some((id) => !open.has(id))) return refuse('proctor', 'One of the proctors is no longer among those who may watch a sitting: choose again.', 'proctors');
  const both = ids.find((id) => candidates.has(id));
  if (both) return refuse('proctor-is-candidate', `${open.get(both)} is a candidate of this sitting and cannot watch it.`, 'proctors');
  return done(ids);
}

async function storeProctors(planner: Planner, sittingId: string, proctors: readonly string[]): Promise<void> {
  await planner.db.deleteFrom('sitting_proctor').where('sitting_id', '=', sittingId).execute();
  if (proctors.length > 0) await planner.db.insertInto('sitting_proctor').values(proctors.map((id) => ({ sitting_id: sittingId, account_id: id }))).execute();
}

const mayScheduleWith = (planner: Planner, formId: string) =>
  planner.db
    .selectFrom('form').innerJoin('exam', 'exam.id', 'form.exam_id').where('form.id', '=', formId).where('exam.state', '<>', 'retired')
    .select(['form.id', 'form.minutes', 'form.content']).forShare('exam').executeTakeFirst();

/** Puts every enrolled student on the list, with a seat by name and the time that accommodations of the day give. */
async function fillList(planner: Planner, sitting: { id: string; minutes: number }, students: readonly { accountId: string }[], day: string): Promise<void> {
  if (students.length === 0) return;
  const allowances = await allowancesOn(planner, students.map((student) => student.accountId), day);
  await planner.db
    .insertInto('candidate')
    .values(students.map((student, place) => ({ sitting_id: sitting.id, account_id: student.accountId, seat: defaultSeat(place), ...timeColumns(sitting.minutes, allowances.get(student.accountId)) })))
    .execute();
}

/**
 * Schedules a form for a class that the actor teaches. Everybody enrolled on the day of the start becomes a candidate,
 * and drawing the papers is queued. Refused with the field that is wrong.
 */
export async function planSitting(context: Context, input: NewSitting): Promise<Result<{ sittingId: string }>> {
  const me = accountId(context.actor);
  if (!me || !holds(context.actor, 'instructor')) return notFound();
  const plan = newSitting.parse(input);
  return inTransaction(context, async (locked) => {
    const planner = { ...locked, me };
    const school = await readSchool(planner.db);
    const taught = await planner.db.selectFrom('class').where('class.id', '=', plan.classId).where(teachesClass(planner.actor, 'class.id')).select('class.id').executeTakeFirst();
    if (!taught) return refuse('class', 'Choose a class that you teach.', 'classId');
    const form = await mayScheduleWith(planner, plan.formId);
    if (!form) return refuse('form', 'This form cannot be scheduled any more: its exam is retired. Choose another.', 'formId');
    const times = readTimes(plan, school, await readClock(planner.db));
    if (!times.ok) return times;
    const day = localDay(times.value.startsAt, school.settings);
    const students = await enrolledOn(planner, plan.classId, day);
    const proctors = await readProctors(planner, plan.proctors, new Set(students.map((student) => student.accountId)));
    if (!proctors.ok) return proctors;
    const content = form.content as { locale: string };
    const { id } = await planner.db
      .insertInto('sitting')
      .values({
        form_id: form.id, class_id: plan.classId, title: plan.title, room: plan.room, minutes: form.minutes, locale: content.locale,
        opens_at: times.value.opensAt, starts_at: times.value.startsAt, latest_start_at: times.value.latestStartAt, secret: randomBytes(32), created_by: me,
      })
      .returning('id')
      .executeTakeFirstOrThrow();
    await storeProctors(planner, id, proctors.value);
    await fillList(planner, { id, minutes: form.minutes }, students, day);
    await queuePapers(planner, id);
    await record(planner, { kind: 'sitting.planned', subject: 'sitting', subjectId: id, data: { form: form.id, class: plan.classId, candidates: students.length } });
    return done({ sittingId: id });
  });
}

/** Changes title, room, times and proctors of a planned sitting; candidates get the accommodations of the new day. */
export async function changeSitting(context: Context, sittingId: string, input: SittingChange): Promise<Result<null>> {
  const change = sittingChange.parse(input);
  return withPlanned(context, sittingId, async (planner, sitting) => {
    const school = await readSchool(planner.db);
    const times = readTimes(change, school, await readClock(planner.db));
    if (!times.ok) return times;
    const candidates = await planner.db.selectFrom('candidate').where('sitting_id', '=', sitting.id).select('account_id').execute();
    const proctors = await readProctors(planner, change.proctors, new Set(candidates.map((candidate) => candidate.account_id)));
    if (!proctors.ok) return proctors;
    const { opensAt, startsAt, latestStartAt } = times.value;
    await planner.db
      .updateTable('sitting')
      .set({ title: change.title, room: change.room, opens_at: opensAt, starts_at: startsAt, latest_start_at: latestStartAt })
      .where('id', '=', sitting.id)
      .execute();
    await storeProctors(planner, sitting.id, proctors.value);
    await takeNeeds(planner, { id: sitting.id, minutes: sitting.minutes }, localDay(startsAt, school.settings));
    await record(planner, { kind: 'sitting.plan-changed', subject: 'sitting', subjectId: sitting.id, data: { starts: startsAt.toISOString(), proctors: proctors.value.length } });
    return done(null);
  });
}

/** Gives every candidate the time and needs of the accommodations valid on `day`. */
async function takeNeeds(planner: Planner, sitting: { id: string; minutes: number }, day: string): Promise<void> {
  const candidates = await planner.db.selectFrom('candidate').where('sitting_id', '=', sitting.id).select(['id', 'account_id']).forUpdate().execute();
  const allowances = await allowancesOn(planner, candidates.map((candidate) => candidate.account_id), day);
  for (const candidate of candidates) {
    await planner.db.updateTable('candidate').set(timeColumns(sitting.minutes, allowances.get(candidate.account_id))).where('id', '=', candidate.id).execute();
  }
}

/** Takes over accommodations that were given, changed or ended since the list was made. */
export async function renewNeeds(context: Context, sittingId: string): Promise<Result<null>> {
  return withPlanned(context, sittingId, async (planner, sitting) => {
    const { settings } = await readSchool(planner.db);
    await takeNeeds(planner, sitting, localDay(sitting.starts_at, settings));
    await record(planner, { kind: 'sitting.needs-renewed', subject: 'sitting', subjectId: sitting.id });
    return done(null);
  });
}

/** Calls a sitting off before it starts; nothing of it is deleted. Whoever was admitted is withdrawn. */
export async function cancelSitting(context: Context, sittingId: string, reason: string): Promise<Result<null>> {
  const note = reason.trim().slice(0, 500);
  if (note === '') return refuse('reason', 'Say why the sitting is cancelled: it stands in the record.', 'reason');
  return withTaught(context, sittingId, async (planner, sitting) => {
    const now = await readClock(planner.db);
    const facts = { state: sitting.state as SittingState, papersDrawn: sitting.papers === 'drawn', opensAt: sitting.opens_at, startsAt: sitting.starts_at };
    const next = nextSitting(facts, 'cancel', now);
    if (!next.ok) return next;
    await planner.db.updateTable('sitting').set({ state: next.value }).where('id', '=', sitting.id).execute();
    for (const row of await lockCandidates(planner, sitting.id)) {
      const clock = nextCandidate(toClock(row), { kind: 'withdraw' }, now);
      if (clock.ok) await storeClock(planner, row.id, clock.value, { epoch: row.epoch + 1 });
    }
    await noteSitting(planner, sitting.id, { kind: 'cancel', note });
    return done(null);
  });
}
