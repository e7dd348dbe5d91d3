import { readClock } from '@/db/clock';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { noteSitting } from '@/lib/sittings/timeline';
import { queueMarking } from './commands';
import { nextCandidate } from './rules';
import type { Seat } from './seat-token';
import { storeClock, toClock } from './store';

/** The candidate's row of the person who is signed in, sitting locked first. */
async function lockOwn(context: LockingContext, sittingId: string) {
  const self = accountId(context.actor);
  if (!self || !isId(sittingId)) return undefined;
  await context.db.selectFrom('sitting').select('id').where('id', '=', sittingId).forUpdate().execute();
  return context.db.selectFrom('candidate').selectAll().where('sitting_id', '=', sittingId).where('account_id', '=', self).forUpdate().executeTakeFirst();
}

/** The candidate's row that a seat token speaks of, if its epoch and device still hold. */
async function lockSeat(context: LockingContext, seat: Seat) {
  await context.db.selectFrom('sitting').select('id').where('id', '=', seat.sittingId).forUpdate().execute();
  return context.db
    .selectFrom('candidate').selectAll()
    .where('id', '=', seat.candidateId).where('sitting_id', '=', seat.sittingId).where('epoch', '=', seat.epoch).where('device', '=', seat.device)
    .forUpdate().executeTakeFirst();
}

/**
 * Takes the seat for this device, once the candidate is admitted. The first device has it; another one takes no part until a
 * proctor frees the seat. Before admission there is no seat to take: the answer then says so.
 */
export async function takeSeat(context: Context, sittingId: string, device: string): Promise<Result<Seat | null>> {
  return inTransaction(context, async (locked) => {
    const row = await lockOwn(locked, sittingId);
    if (!row) return notFound();
    if (row.state === 'expected' || row.state === 'absent' || row.state === 'refused') return done(null);
    if (row.device !== '' && row.device !== device) {
      return refuse('other-device', 'This paper is open on another device. Ask the proctor to move it here.');
    }
    if (row.device === '') {
      await locked.db.updateTable('candidate').set({ device }).where('id', '=', row.id).execute();
      await noteSitting(locked, sittingId, { kind: 'seat-taken', candidateId: row.id });
    }
    return done({ candidateId: row.id, sittingId, device, epoch: row.epoch });
  });
}

/** Records that the candidate agreed to the declaration of the cover page. Agreeing twice changes nothing. */
export async function declare(context: Context, seat: Seat): Promise<Result<null>> {
  return inTransaction(context, async (locked) => {
    const row = await lockSeat(locked, seat);
    if (!row) return notFound();
    if (row.declared_at) return done(null);
    await locked.db.updateTable('candidate').set({ declared_at: await readClock(locked.db) }).where('id', '=', row.id).execute();
    await noteSitting(locked, seat.sittingId, { kind: 'declared', candidateId: row.id });
    return done(null);
  });
}

/** Hands the paper in. A second press, or one that was repeated on a bad network, finds it handed in and is no error. */
export async function handIn(context: Context, seat: Seat): Promise<Result<{ state: string }>> {
  return inTransaction(context, async (locked) => {
    const row = await lockSeat(locked, seat);
    if (!row) return notFound();
    if (row.state === 'handed in' || row.state === 'timed out') return done({ state: row.state });
    const now = await readClock(locked.db);
    const clock = toClock(row);
    let next = nextCandidate(clock, { kind: 'hand-in' }, now);
    if (!next.ok && next.code === 'time-over') next = nextCandidate(clock, { kind: 'time-out' }, now);
    if (!next.ok) return next;
    await storeClock(locked, row.id, next.value);
    await noteSitting(locked, seat.sittingId, { kind: next.value.state === 'timed out' ? 'timed-out' : 'handed-in', candidateId: row.id });
    await queueMarking(locked, row.id);
    return done({ state: next.value.state });
  });
}

/** Calls the proctor. One open call a candidate: pressing again changes nothing. */
export async function callHelp(context: Context, seat: Seat): Promise<Result<null>> {
  return inTransaction(context, async (locked) => {
    const row = await lockSeat(locked, seat);
    if (!row) return notFound();
    const open = await locked.db.selectFrom('help_call').select('id').where('candidate_id', '=', row.id).where('answered_at', 'is', null).executeTakeFirst();
    if (open) return done(null);
    await locked.db.insertInto('help_call').values({ candidate_id: row.id }).execute();
    await noteSitting(locked, seat.sittingId, { kind: 'help-called', candidateId: row.id });
    return done(null);
  });
}
