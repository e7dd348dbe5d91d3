import { sql } from 'kysely';
import { readClock } from '@/db/clock';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { addJob } from '@/lib/jobs/add';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { lockSitting } from '@/lib/sittings/commands';
import { noteSitting } from '@/lib/sittings/timeline';
import type { CandidateEvent } from './model';
import { nextCandidate } from './rules';
import { lockCandidates, storeClock, toClock } from './store';

export type Outcome = { changed: string[]; refused: { candidateId: string; code: string; says: string }[] };
type Change = {
  event: CandidateEvent;
  kind: string;
  note?: string;
  data?: Record<string, string | number | boolean | null>;
  sittingStates?: readonly string[];
  more?: (row: { epoch: number }, now: Date) => { epoch?: number; device?: string; admitted_at?: Date };
};

/** One proctor's change of one or several candidates: sitting first, then candidates, all in one transaction. */
async function change(context: Context, sittingId: string, candidateIds: readonly string[], what: Change): Promise<Result<Outcome>> {
  return inTransaction(context, async (locked) => {
    const sitting = await lockSitting(locked, sittingId);
    if (!sitting) return notFound();
    if (what.sittingStates && !what.sittingStates.includes(sitting.state)) return refuse('wrong-state', `That cannot be done while the sitting is ${sitting.state}.`);
    const rows = await lockCandidates(locked, sittingId, candidateIds);
    if (rows.length === 0) return notFound();
    const now = await readClock(locked.db);
    const outcome: Outcome = { changed: [], refused: [] };
    for (const row of rows) {
      const next = nextCandidate(toClock(row), what.event, now);
      if (!next.ok) {
        outcome.refused.push({ candidateId: row.id, code: next.code, says: next.says });
        continue;
      }
      await storeClock(locked, row.id, next.value, what.more?.(row, now));
      await noteSitting(locked, sittingId, { kind: what.kind, candidateId: row.id, ...(what.data ? { data: what.data } : {}), ...(what.note ? { note: what.note } : {}) });
      outcome.changed.push(row.id);
    }
    return done(outcome);
  });
}

const inTheRoom = ['check-in', 'running', 'paused'] as const;
const needReason = (reason: string): Result<null> => (reason.trim() ? done(null) : refuse('no-reason', 'Say why, in a few words.', 'reason'));

/** Admits candidates: identity seen, seat taken. While the sitting runs they are started one by one. */
export const admit = (context: Context, sittingId: string, candidateIds: readonly string[]) =>
  change(context, sittingId, candidateIds, { event: { kind: 'admit' }, kind: 'admitted', sittingStates: inTheRoom, more: (_row, now) => ({ admitted_at: now }) });

/** Turns a candidate away, with the reason. */
export async function refuseEntry(context: Context, sittingId: string, candidateId: string, reason: string) {
  const given = needReason(reason);
  return given.ok ? change(context, sittingId, [candidateId], { event: { kind: 'refuse' }, kind: 'refused', note: reason, sittingStates: inTheRoom }) : given;
}

/** Starts the clock of admitted candidates after the room has started: the full time, or a cut one with its reason. */
export async function startCandidates(context: Context, sittingId: string, candidateIds: readonly string[], late: { minutes?: number; reason?: string } = {}) {
  if (late.minutes !== undefined) {
    const given = needReason(late.reason ?? '');
    if (!given.ok) return given;
  }
  const event: CandidateEvent = late.minutes === undefined ? { kind: 'start' } : { kind: 'start', seconds: late.minutes * 60 };
  return change(context, sittingId, candidateIds, {
    event, kind: 'started', sittingStates: ['running'], data: { minutes: late.minutes ?? null }, ...(late.reason ? { note: late.reason } : {}),
  });
}

/** Stops one candidate's clock. */
export const pauseCandidate = (context: Context, sittingId: string, candidateId: string, reason: string) =>
  change(context, sittingId, [candidateId], { event: { kind: 'pause' }, kind: 'paused', ...(reason ? { note: reason } : {}) });

/** Runs one candidate's clock again with the time that was left; not while the whole sitting stands. */
export const resumeCandidate = (context: Context, sittingId: string, candidateId: string) =>
  change(context, sittingId, [candidateId], { event: { kind: 'resume' }, kind: 'resumed', sittingStates: ['running'] });

/** Begins a rest break: the clock stands and the sheet is blank, up to the candidate's allowance. */
export const beginRest = (context: Context, sittingId: string, candidateId: string) =>
  change(context, sittingId, [candidateId], { event: { kind: 'begin-rest' }, kind: 'rest-began', sittingStates: ['running'] });

/** Ends a rest break. */
export const endRest = (context: Context, sittingId: string, candidateId: string) =>
  change(context, sittingId, [candidateId], { event: { kind: 'end-rest' }, kind: 'rest-ended', sittingStates: ['running'] });

/** Adds minutes to candidates' time, with the reason. */
export async function addTime(context: Context, sittingId: string, candidateIds: readonly string[], minutes: number, reason: string) {
  const given = needReason(reason);
  if (!given.ok) return given;
  if (!Number.isFinite(minutes) || minutes <= 0 || minutes > 240) return refuse('no-time', 'Give from 1 to 240 minutes.', 'minutes');
  return change(context, sittingId, candidateIds, { event: { kind: 'add-time', seconds: minutes * 60 }, kind: 'time-added', data: { minutes }, note: reason, sittingStates: inTheRoom });
}

/** Takes a candidate out of the sitting for good; the paper so far is kept. Open streams and saves of the seat end. */
export async function withdraw(context: Context, sittingId: string, candidateId: string, reason: string) {
  const given = needReason(reason);
  return given.ok
    ? change(context, sittingId, [candidateId], { event: { kind: 'withdraw' }, kind: 'withdrawn', note: reason, more: (row) => ({ epoch: row.epoch + 1 }) })
    : given;
}

/** Lets a candidate who had ended write on for some minutes, with the reason. */
export async function reopen(context: Context, sittingId: string, candidateId: string, minutes: number, reason: string) {
  const given = needReason(reason);
  if (!given.ok) return given;
  return change(context, sittingId, [candidateId], { event: { kind: 'reopen', seconds: minutes * 60 }, kind: 'reopened', data: { minutes }, note: reason, sittingStates: ['running'] });
}

/** Frees the seat for another device: the old one can save nothing more, the next that signs in takes the seat. */
export async function transfer(context: Context, sittingId: string, candidateId: string, reason: string): Promise<Result<{ epoch: number }>> {
  const given = needReason(reason);
  if (!given.ok) return given;
  return inTransaction(context, async (locked) => {
    if (!(await lockSitting(locked, sittingId))) return notFound();
    const [row] = await lockCandidates(locked, sittingId, [candidateId]);
    if (!row) return notFound();
    await locked.db.updateTable('candidate').set({ epoch: row.epoch + 1, device: '' }).where('id', '=', row.id).execute();
    await noteSitting(locked, sittingId, { kind: 'transferred', candidateId, data: { epoch: row.epoch + 1 }, note: reason });
    return done({ epoch: row.epoch + 1 });
  });
}

/** Records an incident: words of the proctor, about the room or about one candidate. Kept for good; it is no finding. */
export async function noteIncident(context: Context, sittingId: string, candidateId: string | null, words: string): Promise<Result<{ id: string }>> {
  const by = accountId(context.actor);
  if (!words.trim() || words.length > 4000) return refuse('no-words', 'Write what happened, in at most 4,000 characters.', 'words');
  return inTransaction(context, async (locked) => {
    if (!by || !(await lockSitting(locked, sittingId))) return notFound();
    if (candidateId !== null && (await lockCandidates(locked, sittingId, [candidateId])).length === 0) return notFound();
    const { id } = await locked.db
      .insertInto('incident')
      .values({ sitting_id: sittingId, candidate_id: candidateId, noted_by: by, words: words.trim() })
      .returning('id')
      .executeTakeFirstOrThrow();
    await noteSitting(locked, sittingId, { kind: 'incident', ...(candidateId ? { candidateId } : {}), data: { incident: id } });
    return done({ id });
  });
}

/** Answers a call for help: the signal goes out on the board. */
export async function answerHelp(context: Context, sittingId: string, candidateId: string): Promise<Result<null>> {
  const by = accountId(context.actor);
  return inTransaction(context, async (locked) => {
    if (!by || !(await lockSitting(locked, sittingId))) return notFound();
    const answered = await locked.db
      .updateTable('help_call')
      .set({ answered_at: sql`app.now()`, answered_by: by })
      .where('candidate_id', '=', candidateId)
      .where('answered_at', 'is', null)
      .where('candidate_id', 'in', (eb) => eb.selectFrom('candidate').select('id').where('sitting_id', '=', sittingId))
      .executeTakeFirst();
    if (answered.numUpdatedRows === 0n) return refuse('nothing-open', 'There is no open call of this candidate.');
    await noteSitting(locked, sittingId, { kind: 'help-answered', candidateId });
    return done(null);
  });
}

/** Puts the marking of one ended paper into the queue, in the transaction that ended it. */
export const queueMarking = (locked: LockingContext, candidateId: string): Promise<void> =>
  addJob(locked.db, 'mark-paper', { candidateId }, { key: `mark-paper:${candidateId}` });
