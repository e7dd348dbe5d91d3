import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import type { FlagChange, Revision, SaveOutcome } from './model';
import type { Seat } from './seat-token';

type SaveRow = { now: Date; open: boolean; saved: { question: number; part: string; sequence: number }[] };

/**
 * Stores revisions of answers, durable before it returns. One statement: its WHERE is the end of time, the state and the epoch,
 * so nothing is asked before it. Sending a revision again is no error and stores nothing twice. `db` is the candidate's role.
 * What was there before is looked up by its key, one row for one sent (LATERAL with LIMIT), however much the candidate has written.
 * The row is read FOR SHARE: a hand-in that goes on at the same moment waits, so no save slips in behind it.
 */
export async function saveResponses(db: Kysely<DB>, seat: Seat, revisions: readonly Revision[]): Promise<SaveOutcome> {
  const sent = JSON.stringify(revisions.map(({ question, part, sequence, answer }) => ({ question, part, sequence, answer })));
  const { rows } = await sql<SaveRow>`
    with seat as materialized (
      select id, device from candidate
      where id = ${seat.candidateId} and epoch = ${seat.epoch} and device = ${seat.device} and state = 'writing' and app.now() < ends_at
      for share
    ), sent as materialized (
      select r.question, r.part, r.sequence, r.answer from json_to_recordset(${sent}::json) as r(question int, part text, sequence bigint, answer text)
    ), stored as (
      insert into response (candidate_id, question, part, sequence, answer, device, at)
      select seat.id, sent.question, sent.part, sent.sequence, sent.answer, seat.device, app.now()
      from seat, sent
      on conflict do nothing
      returning question, part, sequence
    )
    select app.now() as now, exists (select from seat) as open,
      (select coalesce(json_agg(json_build_object('question', s.question, 'part', s.part, 'sequence', s.sequence)), '[]') from (
        select question, part, sequence from stored
        union
        select sent.question, sent.part, sent.sequence from sent cross join lateral (
          select from response r
          where r.candidate_id = ${seat.candidateId} and r.question = sent.question and r.part = sent.part and r.sequence = sent.sequence and r.answer = sent.answer
          limit 1
        ) there
      ) s) as saved`.execute(db);
  const row = rows[0];
  if (!row) throw new Error('The save statement returned no row.');
  if (row.open) return { ok: true, now: row.now.getTime(), saved: row.saved };
  return refuseSave(db, seat, revisions, row);
}

/** Why a save found no open paper; what came shortly after the end is kept as a claim for the proctor. */
async function refuseSave(db: Kysely<DB>, seat: Seat, revisions: readonly Revision[], row: SaveRow): Promise<SaveOutcome> {
  const now = row.now.getTime();
  const found = await db
    .selectFrom('candidate')
    .select(['state', 'epoch', 'device', 'ends_at', 'ended_at'])
    .select((eb) => eb.selectFrom('school').select(sql<number>`coalesce((settings->>'graceSeconds')::int, 120)`.as('grace')).as('grace'))
    .where('id', '=', seat.candidateId)
    .where('sitting_id', '=', seat.sittingId)
    .executeTakeFirst();
  if (!found) return { ok: false, code: 'not-found', says: 'There is no paper for this device.', now, claimed: [] };
  if (found.epoch !== seat.epoch || found.device !== seat.device) {
    return { ok: false, code: 'other-device', says: 'This paper was moved to another device. What is written here was not taken.', now, claimed: [] };
  }
  const end = found.ended_at ?? found.ends_at;
  const ended = found.state === 'handed in' || found.state === 'timed out' || (found.state === 'writing' && end !== null && now >= end.getTime());
  if (!ended || !end) return { ok: false, code: 'stopped', says: 'The clock stands. What you typed is kept on this device and sent when it runs again.', now, claimed: [] };
  // Revisions that were stored before the end need no claim.
  const already = new Set(row.saved.map((saved) => `${saved.question} ${saved.part} ${saved.sequence}`));
  const late = revisions.filter((revision) => !already.has(`${revision.question} ${revision.part} ${revision.sequence}`));
  const claimed = now <= end.getTime() + (found.grace ?? 0) * 1000 ? await keepClaims(db, seat, late) : [];
  return { ok: false, code: 'ended', says: 'The time of this paper is over.', now, claimed: [...row.saved, ...claimed] };
}

async function keepClaims(db: Kysely<DB>, seat: Seat, revisions: readonly Revision[]) {
  if (revisions.length === 0) return [];
  await db
    .insertInto('claim')
    .values(revisions.map(({ question, part, sequence, answer, typedAt }) => ({
      candidate_id: seat.candidateId, question, part, sequence, answer, typed_at: new Date(typedAt),
    })))
    .onConflict((conflict) => conflict.doNothing())
    .execute();
  return revisions.map(({ question, part, sequence }) => ({ question, part, sequence }));
}

/** Keeps which questions are flagged for later; the higher sequence wins. Not while the paper is closed. */
export async function saveFlag(db: Kysely<DB>, seat: Seat, change: FlagChange): Promise<boolean> {
  const { rows } = await sql<{ open: boolean }>`
    with seat as (
      select id from candidate where id = ${seat.candidateId} and epoch = ${seat.epoch} and device = ${seat.device} and state = 'writing' and app.now() < ends_at
    ), stored as (
      insert into candidate_flag (candidate_id, question, sequence, flagged)
      select id, ${change.question}, ${change.sequence}, ${change.flagged} from seat
      on conflict (candidate_id, question) do update set sequence = excluded.sequence, flagged = excluded.flagged
      where candidate_flag.sequence < excluded.sequence
    )
    select exists (select from seat) as open`.execute(db);
  return rows[0]?.open ?? false;
}
