import { readClock } from '@/db/clock';
import { nextCandidate } from '@/lib/candidates/rules';
import { lockCandidates, storeClock, toClock } from '@/lib/candidates/store';
import type { CandidateEvent } from '@/lib/candidates/model';
import { type Context, inTransaction, type LockingContext } from '@/lib/context';
import { addJob } from '@/lib/jobs/add';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import type { SittingEvent, SittingState } from './model';
import { mayRunSitting } from './relation';
import { nextSitting } from './rules';
import { noteSitting } from './timeline';

/** The sitting's row under lock, if the actor may run it. */
export async function lockSitting(context: LockingContext, sittingId: string) {
  if (!isId(sittingId)) return undefined;
  return context.db.selectFrom('sitting').selectAll('sitting').where('sitting.id', '=', sittingId).where(mayRunSitting(context.actor)).forUpdate().executeTakeFirst();
}

async function move(
  context: Context,
  sittingId: string,
  event: SittingEvent,
  follow: (locked: LockingContext, now: Date) => Promise<Record<string, number>>,
  words: { note?: string } = {},
): Promise<Result<{ state: SittingState }>> {
  return inTransaction(context, async (locked) => {
    const sitting = await lockSitting(locked, sittingId);
    if (!sitting) return notFound();
    const now = await readClock(locked.db);
    const facts = { state: sitting.state as SittingState, papersDrawn: sitting.papers === 'drawn', opensAt: sitting.opens_at, startsAt: sitting.starts_at };
    const next = nextSitting(facts, event, now);
    if (!next.ok) return next;
    const stamps = {
      ...(event === 'start' ? { started_at: now } : {}),
      ...(event === 'pause' ? { paused_at: now } : {}),
      ...(event === 'resume' ? { paused_at: null } : {}),
      ...(event === 'close' || event === 'abandon' ? { closed_at: now } : {}),
      ...(event === 'reconcile' ? { reconciled_at: now, reconciled_by: context.actor.kind === 'account' ? context.actor.id : null } : {}),
    };
    await locked.db.updateTable('sitting').set({ state: next.value, ...stamps }).where('id', '=', sittingId).execute();
    const data = await follow(locked, now);
    await noteSitting(locked, sittingId, { kind: event, data, ...words });
    return done({ state: next.value });
  });
}

/** Applies one event to every candidate that it fits; the others stay as they are. Returns how many changed. */
async function applyToAll(locked: LockingContext, sittingId: string, event: CandidateEvent, now: Date): Promise<number> {
  let changed = 0;
  for (const row of await lockCandidates(locked, sittingId)) {
    const next = nextCandidate(toClock(row), event, now);
    if (!next.ok) continue;
    await storeClock(locked, row.id, next.value);
    changed += 1;
  }
  return changed;
}

/** Opens check-in: candidates may arrive and be admitted. */
export const openCheckIn = (context: Context, sittingId: string) => move(context, sittingId, 'open-check-in', async () => ({}));

/** Starts the sitting: the clock of every admitted candidate runs from now. Those admitted later are started one by one. */
export const startSitting = (context: Context, sittingId: string) =>
  move(context, sittingId, 'start', async (locked, now) => ({ started: await applyToAll(locked, sittingId, { kind: 'start' }, now) }));

/** Stops every running clock at once; time left is kept to the millisecond. */
export const pauseSitting = (context: Context, sittingId: string, reason: string) =>
  move(context, sittingId, 'pause', async (locked, now) => {
    await timeOutDue(locked, sittingId, now);
    return { paused: await applyToAll(locked, sittingId, { kind: 'pause' }, now) };
  }, { note: reason });

/** Runs the clocks again, each with the time it had left. */
export const resumeSitting = (context: Context, sittingId: string) =>
  move(context, sittingId, 'resume', async (locked, now) => ({ resumed: await applyToAll(locked, sittingId, { kind: 'resume' }, now) }));

/** Closes the sitting: who still writes is handed in as of now, who never came is absent. */
export const closeSitting = (context: Context, sittingId: string) =>
  move(context, sittingId, 'close', async (locked, now) => {
    const timedOut = await timeOutDue(locked, sittingId, now);
    const handedIn = await applyToAll(locked, sittingId, { kind: 'hand-in' }, now);
    const withdrawn = await applyToAll(locked, sittingId, { kind: 'withdraw' }, now);
    const absent = await applyToAll(locked, sittingId, { kind: 'mark-absent' }, now);
    await addJob(locked.db, 'mark-sitting', { sittingId }, { key: `mark-sitting:${sittingId}` });
    return { 'timed-out': timedOut, 'handed-in': handedIn, withdrawn, absent };
  });

/** Signs the sitting: the register and the papers agree. */
export const reconcileSitting = (context: Context, sittingId: string) => move(context, sittingId, 'reconcile', async () => ({}));

/** Ends a sitting that cannot be finished; its papers are kept and a make-up sitting is planned. */
export const abandonSitting = (context: Context, sittingId: string, reason: string) =>
  move(context, sittingId, 'abandon', async (locked, now) => ({ withdrawn: await applyToAll(locked, sittingId, { kind: 'withdraw' }, now) }), { note: reason });

/** Records the end of every paper of the sitting whose time is over, each at its own stated end. */
export async function timeOutDue(locked: LockingContext, sittingId: string, now: Date): Promise<number> {
  let changed = 0;
  for (const row of await lockCandidates(locked, sittingId)) {
    const next = nextCandidate(toClock(row), { kind: 'time-out' }, now);
    if (!next.ok) continue;
    await storeClock(locked, row.id, next.value);
    await noteSitting(locked, sittingId, { kind: 'timed-out', candidateId: row.id });
    await addJob(locked.db, 'mark-paper', { candidateId: row.id }, { key: `mark-paper:${row.id}` });
    changed += 1;
  }
  return changed;
}

/**
 * The worker's regular look: records ends that have come. The predicate of saving has ended those papers already;
 * this only writes it down, once, whoever looks first.
 */
export async function recordEnds(context: Context): Promise<number> {
  const now = await readClock(context.db);
  const due = await context.db.selectFrom('candidate').select('sitting_id').where('state', '=', 'writing').where('ends_at', '<=', now).distinct().execute();
  let changed = 0;
  for (const { sitting_id: sittingId } of due) {
    changed += await inTransaction(context, async (locked) => {
      const sitting = await locked.db.selectFrom('sitting').select('id').where('id', '=', sittingId).forUpdate().skipLocked().executeTakeFirst();
      return sitting ? timeOutDue(locked, sittingId, now) : 0;
    });
  }
  return changed;
}
