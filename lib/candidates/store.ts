import type { Selectable } from 'kysely';
import type { Candidate } from '@/db/types';
import type { LockingContext } from '@/lib/context';
import type { CandidateClock, CandidateState } from './model';

type ClockRow = Pick<Selectable<Candidate>,
  'state' | 'seconds_allowed' | 'started_at' | 'ends_at' | 'seconds_left' | 'rest_seconds_allowed' | 'rest_seconds_used' | 'rest_began_at' | 'ended_at'>;

export const clockColumns = [
  'candidate.state', 'candidate.seconds_allowed', 'candidate.started_at', 'candidate.ends_at', 'candidate.seconds_left',
  'candidate.rest_seconds_allowed', 'candidate.rest_seconds_used', 'candidate.rest_began_at', 'candidate.ended_at',
] as const;

/** The one place that maps a row to the clock that the rules work on. */
export const toClock = (row: ClockRow): CandidateClock => ({
  state: row.state as CandidateState,
  secondsAllowed: row.seconds_allowed,
  startedAt: row.started_at,
  endsAt: row.ends_at,
  secondsLeft: row.seconds_left,
  restSecondsAllowed: row.rest_seconds_allowed,
  restSecondsUsed: row.rest_seconds_used,
  restBeganAt: row.rest_began_at,
  endedAt: row.ended_at,
});

/** Candidates of a sitting, locked for a change, in a steady order so that two commands cannot wait for each other. */
export async function lockCandidates(context: LockingContext, sittingId: string, ids?: readonly string[]) {
  let query = context.db.selectFrom('candidate').selectAll('candidate').where('sitting_id', '=', sittingId);
  if (ids) query = query.where('id', 'in', ids.length > 0 ? [...ids] : ['00000000-0000-0000-0000-000000000000']);
  return query.orderBy('id').forUpdate().execute();
}

/** Stores the clock the rules gave; `more` holds what else the command changes in the same row. */
export async function storeClock(
  context: LockingContext,
  id: string,
  clock: CandidateClock,
  more: { epoch?: number; device?: string; admitted_at?: Date } = {},
): Promise<void> {
  await context.db
    .updateTable('candidate')
    .set({
      state: clock.state, seconds_allowed: Math.round(clock.secondsAllowed), started_at: clock.startedAt, ends_at: clock.endsAt,
      seconds_left: clock.secondsLeft, rest_seconds_used: clock.restSecondsUsed, rest_began_at: clock.restBeganAt, ended_at: clock.endedAt, ...more,
    })
    .where('id', '=', id)
    .execute();
}
