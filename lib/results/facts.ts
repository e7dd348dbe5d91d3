import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import { resultStates } from './model';
import type { SittingFacts } from './rules';

export type FactsOf = SittingFacts & { mean: number | null };

type Row = {
  sitting_id: string; state: string; candidates: number; unmarked: number; for_marker: number; claims: number; withheld: number; mean: number | null;
} & Record<`in_${(typeof resultStates)[number]}`, number>;

/** What is known of the results of sittings, for many at once. For callers that authorised already. */
export async function sittingFacts(db: Kysely<DB>, sittingIds: readonly string[]): Promise<Map<string, FactsOf>> {
  if (sittingIds.length === 0) return new Map();
  const states = sql.join(resultStates.map((state) => sql`count(*) filter (where r.state = ${state})::int as ${sql.id(`in_${state}`)}`));
  const { rows } = await sql<Row>`
    with newest_result as (select distinct on (candidate_id) * from result order by candidate_id, issue desc),
      newest_mark as (
        select distinct on (m.candidate_id, m.question, m.part) m.candidate_id, m.verdict
        from mark m join candidate c on c.id = m.candidate_id where c.sitting_id = any(${sittingIds}::uuid[])
        order by m.candidate_id, m.question, m.part, m.issue desc
      ),
      waiting as (select candidate_id, count(*)::int as parts from newest_mark where verdict = 'for-marker' group by candidate_id),
      open_claim as (select candidate_id, count(*)::int as claims from claim where decision is null group by candidate_id)
    select s.id as sitting_id, s.state, count(c.id)::int as candidates,
      count(c.id) filter (where r.candidate_id is null)::int as unmarked,
      coalesce(sum(w.parts), 0)::int as for_marker, coalesce(sum(o.claims), 0)::int as claims,
      count(*) filter (where r.withheld)::int as withheld,
      avg(r.total) filter (where r.outcome <> 'absent')::float8 as mean, ${states}
    from sitting s left join candidate c on c.sitting_id = s.id left join newest_result r on r.candidate_id = c.id
      left join waiting w on w.candidate_id = c.id left join open_claim o on o.candidate_id = c.id
    where s.id = any(${sittingIds}::uuid[]) group by s.id`.execute(db);
  return new Map(rows.map((row) => [row.sitting_id, {
    closed: row.state === 'closed' || row.state === 'reconciled', reconciled: row.state === 'reconciled', candidates: row.candidates,
    unmarked: row.unmarked, forMarker: row.for_marker, claims: row.claims, withheld: row.withheld, mean: row.mean,
    states: { provisional: row.in_provisional, moderated: row.in_moderated, released: row.in_released, sealed: row.in_sealed, amended: row.in_amended },
  }]));
}
