import { type Kysely, sql } from 'kysely';
import { readClock } from '@/db/clock';
import type { DB } from '@/db/types';
import { accountId, type Context } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { zoneOffset } from '@/lib/school/times';
import type { CandidateState, RoomCover, RoomState } from './model';
import type { Seat } from './seat-token';
import { secondsLeftAt } from './rules';
import { toClock } from './store';

const stateColumns = [
  'candidate.id', 'candidate.state', 'candidate.epoch', 'candidate.device', 'candidate.seconds_allowed', 'candidate.rest_seconds_allowed',
  'candidate.rest_seconds_used', 'candidate.rest_began_at', 'candidate.started_at', 'candidate.ends_at', 'candidate.seconds_left',
  'candidate.ended_at', 'candidate.declared_at', 'candidate.seat', 'sitting.state as sitting_state',
] as const;

type StateRow = {
  id: string; state: string; epoch: number; seconds_allowed: number; rest_seconds_allowed: number; rest_seconds_used: number;
  rest_began_at: Date | null; started_at: Date | null; ends_at: Date | null; seconds_left: number | null; ended_at: Date | null;
  declared_at: Date | null; seat: string; sitting_state: string;
};

/** A paper whose time is over is told as timed out at once, even before the end was written down. */
function toRoomState(row: StateRow, now: Date, helpCalled: boolean): RoomState {
  const over = row.state === 'writing' && row.ends_at !== null && now >= row.ends_at;
  return {
    candidateId: row.id,
    state: over ? 'timed out' : (row.state as CandidateState),
    sittingState: row.sitting_state,
    epoch: row.epoch,
    now: now.getTime(),
    endsAt: over ? null : (row.ends_at?.getTime() ?? null),
    secondsLeft: secondsLeftAt(toClock(row), now),
    secondsAllowed: row.seconds_allowed,
    startedAt: row.started_at?.getTime() ?? null,
    endedAt: over ? (row.ends_at?.getTime() ?? null) : (row.ended_at?.getTime() ?? null),
    seat: row.seat,
    helpCalled,
    declared: row.declared_at !== null,
  };
}

/** State of the seat that a token speaks of; not found once the seat was moved or the candidate withdrawn from under it. `db`: the candidate's role. */
export async function readRoomState(db: Kysely<DB>, seat: Seat): Promise<Result<RoomState>> {
  const row = await db
    .selectFrom('candidate')
    .innerJoin('sitting', 'sitting.id', 'candidate.sitting_id')
    .select(stateColumns)
    .where('candidate.id', '=', seat.candidateId)
    .where('candidate.sitting_id', '=', seat.sittingId)
    .where('candidate.epoch', '=', seat.epoch)
    .where('candidate.device', '=', seat.device)
    .executeTakeFirst();
  if (!row) return notFound();
  const help = await db.selectFrom('help_call').select('id').where('candidate_id', '=', row.id).where('answered_at', 'is', null).executeTakeFirst();
  return done(toRoomState(row, await readClock(db), help !== undefined));
}

/** Cover and state for the person who is signed in, before there is a seat. */
export async function readOwnPlace(context: Context, sittingId: string): Promise<Result<{ cover: RoomCover; state: RoomState }>> {
  const self = accountId(context.actor);
  if (!self || !isId(sittingId)) return notFound();
  const row = await context.db
    .selectFrom('candidate')
    .innerJoin('sitting', 'sitting.id', 'candidate.sitting_id')
    .innerJoin('account', 'account.id', 'candidate.account_id')
    .leftJoin('paper', 'paper.candidate_id', 'candidate.id')
    .select(stateColumns)
    .select([
      sql<string | null>`paper.content->'cover'->>'instructionsHtml'`.as('instructions'), sql<string | null>`paper.content->'cover'->>'declaration'`.as('declaration'),
      sql<string[] | null>`paper.content->'materials'`.as('materials'), sql<string[] | null>`paper.content->'passRule'`.as('pass_rule'),
    ])
    .select(['sitting.id as sitting_id', 'sitting.title', 'sitting.room', 'sitting.minutes', 'sitting.starts_at', 'sitting.locale', 'account.name'])
    .where('sitting.id', '=', sittingId)
    .where('candidate.account_id', '=', self)
    .executeTakeFirst();
  if (!row) return notFound();
  const [now, school] = [await readClock(context.db), await readSchool(context.db)];
  const cover = {
    sittingId: row.sitting_id, title: row.title, room: row.room, candidateName: row.name, minutes: row.minutes,
    startsAt: row.starts_at.getTime(), zoneOffset: zoneOffset(now, school.settings), locale: row.locale,
    instructionsHtml: row.instructions ?? '', declaration: row.declaration ?? '', materials: row.materials ?? [], passRule: row.pass_rule ?? [],
  };
  return done({ cover, state: toRoomState(row, now, false) });
}

export type OpenPaper = { content: unknown; answers: { question: number; part: string; sequence: number; answer: string }[]; flags: { question: number; sequence: number; flagged: boolean }[] };

/** The paper and what the server has of its answers, once the clock has started. Never a key: the role has no grant on them. */
export async function readPaper(db: Kysely<DB>, seat: Seat): Promise<Result<OpenPaper>> {
  const row = await db
    .selectFrom('candidate')
    .innerJoin('paper', 'paper.candidate_id', 'candidate.id')
    .select('paper.content')
    .where('candidate.id', '=', seat.candidateId)
    .where('candidate.sitting_id', '=', seat.sittingId)
    .where('candidate.epoch', '=', seat.epoch)
    .where('candidate.device', '=', seat.device)
    .where('candidate.state', 'in', ['writing', 'paused', 'on rest break'])
    .executeTakeFirst();
  if (!row) return notFound();
  const { rows: answers } = await sql<{ question: number; part: string; sequence: number; answer: string }>`
    select distinct on (question, part) question, part, sequence, answer from response
    where candidate_id = ${seat.candidateId} order by question, part, sequence desc`.execute(db);
  const flags = await db.selectFrom('candidate_flag').select(['question', 'sequence', 'flagged']).where('candidate_id', '=', seat.candidateId).execute();
  return done({ content: row.content, answers, flags });
}

/** Whether a question has a non-blank answer now, counted for a whole sitting: what the board shows as answered. */
export async function countAnswered(db: Kysely<DB>, sittingId: string): Promise<Map<string, { parts: number; lastAt: Date | null }>> {
  const { rows } = await sql<{ candidate_id: string; parts: number; last_at: Date | null }>`
    select candidate_id, count(*) filter (where answer <> '')::int as parts, max(at) as last_at from (
      select distinct on (r.candidate_id, r.question, r.part) r.candidate_id, r.answer, r.at
      from response r join candidate c on c.id = r.candidate_id
      where c.sitting_id = ${sittingId}
      order by r.candidate_id, r.question, r.part, r.sequence desc
    ) latest group by candidate_id`.execute(db);
  return new Map(rows.map((row) => [row.candidate_id, { parts: row.parts, lastAt: row.last_at }]));
}

/** Renews the sign of life of a seat, at most once in five seconds; true when it was renewed. */
export async function markHeard(db: Kysely<DB>, seat: Seat): Promise<boolean> {
  const renewed = await db
    .updateTable('candidate')
    .set({ heard_at: sql`app.now()` })
    .where('id', '=', seat.candidateId)
    .where('epoch', '=', seat.epoch)
    .where('device', '=', seat.device)
    .where((eb) => eb.or([eb('heard_at', 'is', null), eb('heard_at', '<', sql<Date>`app.now() - interval '5 seconds'`)]))
    .executeTakeFirst();
  return renewed.numUpdatedRows > 0n;
}
