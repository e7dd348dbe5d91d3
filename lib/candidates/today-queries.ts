import { sql } from 'kysely';
import { readClock } from '@/db/clock';
import { accountId, type Context } from '@/lib/context';
import type { CandidateState, OwnSitting } from './model';

/** A student's own sittings that are ahead, going on or over, soonest first; and the time on the server. */
export async function readToday(context: Context): Promise<{ now: Date; ahead: OwnSitting[]; over: OwnSitting[] }> {
  const self = accountId(context.actor);
  const now = await readClock(context.db);
  if (!self) return { now, ahead: [], over: [] };
  const rows = await context.db
    .selectFrom('candidate')
    .innerJoin('sitting', 'sitting.id', 'candidate.sitting_id')
    .leftJoin('paper', 'paper.candidate_id', 'candidate.id')
    .select([
      'sitting.id as sittingId', 'candidate.id as candidateId', 'sitting.title', 'sitting.room', 'candidate.seat', 'sitting.state as sittingState', 'candidate.state',
      'sitting.opens_at as opensAt', 'sitting.starts_at as startsAt', 'sitting.latest_start_at as latestStartAt', 'candidate.seconds_allowed', 'candidate.rehearsed_at', 'candidate.ended_at as endedAt',
    ])
    .select(sql<string[] | null>`paper.content->'materials'`.as('materials'))
    .where('candidate.account_id', '=', self)
    .where('sitting.state', '!=', 'cancelled')
    .orderBy('sitting.starts_at')
    .execute();
  const own = rows.map(({ seconds_allowed: seconds, rehearsed_at: rehearsed, materials, state, ...row }) => ({
    ...row, state: state as CandidateState, minutesAllowed: Math.round(seconds / 60), materials: materials ?? [], rehearsed: rehearsed !== null,
  }));
  const isAhead = (row: OwnSitting) => ['planned', 'check-in', 'running', 'paused'].includes(row.sittingState) && !['handed in', 'timed out', 'withdrawn'].includes(row.state);
  return { now, ahead: own.filter(isAhead), over: own.filter((row) => !isAhead(row)).reverse() };
}
