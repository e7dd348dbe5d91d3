import { type Kysely, sql } from 'kysely';
import { readClock } from '@/db/clock';
import type { DB } from '@/db/types';
import { secondsLeftAt } from '@/lib/candidates/rules';
import { toClock } from '@/lib/candidates/store';
import type { CandidateState } from '@/lib/candidates/model';
import type { Context } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { zoneOffset } from '@/lib/school/times';
import type { BoardSeat, BoardSnapshot, TimelineEntry } from './board-model';
import type { SittingState } from './model';
import { mayRunSitting, maySeeSitting } from './relation';

async function answeredByQuestion(db: Kysely<DB>, sittingId: string) {
  const { rows } = await sql<{ candidate_id: string; question: number; parts: number; last_at: Date }>`
    select candidate_id, question, count(*) filter (where answer <> '')::int as parts, max(at) as last_at from (
      select distinct on (r.candidate_id, r.question, r.part) r.candidate_id, r.question, r.answer, r.at
      from response r join candidate c on c.id = r.candidate_id
      where c.sitting_id = ${sittingId}
      order by r.candidate_id, r.question, r.part, r.sequence desc
    ) latest group by candidate_id, question`.execute(db);
  const byCandidate = new Map<string, { parts: Map<number, number>; lastAt: number }>();
  for (const row of rows) {
    const entry = byCandidate.get(row.candidate_id) ?? { parts: new Map<number, number>(), lastAt: 0 };
    entry.parts.set(row.question, row.parts);
    entry.lastAt = Math.max(entry.lastAt, row.last_at.getTime());
    byCandidate.set(row.candidate_id, entry);
  }
  return byCandidate;
}

/** How many parts each question has: all papers of a form agree in that, so one is looked at. */
async function partsOfQuestion(db: Kysely<DB>, sittingId: string): Promise<number[]> {
  const { rows } = await sql<{ parts: number }>`
    select jsonb_array_length(question->'parts') as parts
    from (select p.content from paper p join candidate c on c.id = p.candidate_id where c.sitting_id = ${sittingId} order by c.id limit 1) one,
      jsonb_array_elements(one.content->'questions') with ordinality as asked(question, place)
    order by place`.execute(db);
  return rows.map((row) => row.parts);
}

async function signals(db: Kysely<DB>, sittingId: string) {
  const { rows } = await sql<{ candidate_id: string; help: boolean; incidents: number; claims: number }>`
    select c.id as candidate_id,
      exists (select from help_call h where h.candidate_id = c.id and h.answered_at is null) as help,
      (select count(*)::int from incident i where i.candidate_id = c.id) as incidents,
      (select count(*)::int from claim l where l.candidate_id = c.id and l.decision is null) as claims
    from candidate c where c.sitting_id = ${sittingId}`.execute(db);
  return new Map(rows.map((row) => [row.candidate_id, row]));
}

async function readSeats(db: Kysely<DB>, sittingId: string, now: Date, questions: number): Promise<BoardSeat[]> {
  const [answered, signal, rows] = [
    await answeredByQuestion(db, sittingId),
    await signals(db, sittingId),
    await db.selectFrom('candidate').innerJoin('account', 'account.id', 'candidate.account_id')
      .selectAll('candidate').select(['account.name', 'account.sort_name', 'account.learner_number'])
      .where('candidate.sitting_id', '=', sittingId).orderBy('account.sort_name').orderBy('candidate.id').execute(),
  ];
  return rows.map((row) => {
    const own = answered.get(row.id);
    const over = row.state === 'writing' && row.ends_at !== null && now >= row.ends_at;
    const heard = Math.max(row.heard_at?.getTime() ?? 0, own?.lastAt ?? 0);
    return {
      candidateId: row.id, name: row.name, learnerNumber: row.learner_number, seat: row.seat,
      state: over ? 'timed out' : (row.state as CandidateState), need: row.need,
      answeredParts: Array.from({ length: questions }, (_, place) => own?.parts.get(place + 1) ?? 0),
      endsAt: row.ends_at?.getTime() ?? null, secondsLeft: secondsLeftAt(toClock(row), now), secondsAllowed: row.seconds_allowed,
      restSecondsLeft: Math.max(0, row.rest_seconds_allowed - row.rest_seconds_used), heardAt: heard || null,
      startedAt: row.started_at?.getTime() ?? null, endedAt: row.ended_at?.getTime() ?? null, hasDevice: row.device !== '',
      declared: row.declared_at !== null, helpCalled: signal.get(row.id)?.help ?? false,
      incidents: signal.get(row.id)?.incidents ?? 0, claims: signal.get(row.id)?.claims ?? 0,
    };
  });
}

/** The board of a sitting, for those who may see it; `mayRun` says who may act. */
export async function readBoard(context: Context, sittingId: string): Promise<Result<BoardSnapshot>> {
  if (!isId(sittingId)) return notFound();
  const { db, actor } = context;
  const row = await db
    .selectFrom('sitting')
    .innerJoin('class', 'class.id', 'sitting.class_id')
    .selectAll('sitting')
    .select('class.name as class_name')
    .select((eb) => eb.exists(eb.selectFrom('sitting as own').select('own.id').whereRef('own.id', '=', 'sitting.id').where(mayRunSitting(actor))).as('may_run'))
    .where('sitting.id', '=', sittingId)
    .where(maySeeSitting(actor))
    .executeTakeFirst();
  if (!row) return notFound();
  const now = await readClock(db);
  const school = await readSchool(db);
  const parts = await partsOfQuestion(db, sittingId);
  const proctors = await db.selectFrom('sitting_proctor').innerJoin('account', 'account.id', 'sitting_proctor.account_id')
    .select('account.name').where('sitting_id', '=', sittingId).orderBy('account.sort_name').execute();
  return done({
    now: now.getTime(), number: row.counter, mayRun: Boolean(row.may_run),
    sitting: {
      id: row.id, title: row.title, room: row.room, className: row.class_name, state: row.state as SittingState, papers: row.papers,
      opensAt: row.opens_at.getTime(), startsAt: row.starts_at.getTime(), latestStartAt: row.latest_start_at.getTime(), minutes: row.minutes,
      startedAt: row.started_at?.getTime() ?? null, pausedAt: row.paused_at?.getTime() ?? null, closedAt: row.closed_at?.getTime() ?? null,
      zoneOffset: zoneOffset(now, school.settings), locale: row.locale,
    },
    proctors: proctors.map((proctor) => proctor.name),
    candidatesPerProctor: school.settings.candidatesPerProctor,
    partsOfQuestion: parts,
    seats: await readSeats(db, sittingId, now, parts.length),
  });
}

/** The time line of one candidate, or of the whole sitting, newest first, with the words that stand in the erasable table. */
export async function readTimeline(context: Context, sittingId: string, candidateId: string | null): Promise<Result<TimelineEntry[]>> {
  if (!isId(sittingId)) return notFound();
  const { db, actor } = context;
  const seen = await db.selectFrom('sitting').select('id').where('id', '=', sittingId).where(maySeeSitting(actor)).executeTakeFirst();
  if (!seen) return notFound();
  const { rows } = await sql<{ number: number; at: Date; kind: string; actor: string | null; data: TimelineEntry['data']; words: string | null }>`
    select se.number, se.at, se.kind, a.name as actor, se.data, coalesce(n.note, i.words) as words
    from sitting_event se
    left join account a on a.id = se.actor_id
    left join event e on e.subject_id = coalesce(se.candidate_id, se.sitting_id)::text and e.data->>'sitting' = se.sitting_id::text and (e.data->>'number')::bigint = se.number
    left join event_note n on n.event_id = e.id
    left join incident i on i.id::text = se.data->>'incident'
    where se.sitting_id = ${sittingId} and (${candidateId}::uuid is null or se.candidate_id = ${candidateId}::uuid)
    order by se.number desc limit 500`.execute(db);
  return done(rows.map((row) => ({ ...row, at: row.at.getTime() })));
}
