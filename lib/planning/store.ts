import { sql } from 'kysely';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { addJob } from '@/lib/jobs/add';
import { notFound, refuse, type Result } from '@/lib/result';
import type { Allowance } from './model';
import { teachesClass } from './relation';
import { needSays, noAllowance, secondsAllowed } from './rules';

export type Planner = LockingContext & { me: string };

const lockSitting = (context: LockingContext, sittingId: string) =>
  context.db.selectFrom('sitting').selectAll('sitting').where('sitting.id', '=', sittingId).where(teachesClass(context.actor, 'sitting.class_id')).forUpdate().executeTakeFirst();
export type PlannedSitting = NonNullable<Awaited<ReturnType<typeof lockSitting>>>;

type Work<Value> = (planner: Planner, sitting: PlannedSitting) => Promise<Result<Value>>;

/** Authorises, locks the sitting and runs `work`, whatever its state; missing and forbidden look alike. */
export async function withTaught<Value>(context: Context, sittingId: string, work: Work<Value>): Promise<Result<Value>> {
  const me = accountId(context.actor);
  if (!me || !isId(sittingId)) return notFound();
  return inTransaction(context, async (locked) => {
    const sitting = await lockSitting(locked, sittingId);
    return sitting ? work({ ...locked, me }, sitting) : notFound();
  });
}

/** As `withTaught`, while the sitting is still planned. */
export const withPlanned = <Value>(context: Context, sittingId: string, work: Work<Value>): Promise<Result<Value>> =>
  withTaught(context, sittingId, async (planner, sitting) =>
    sitting.state === 'planned' ? work(planner, sitting) : refuse('state', `The plan can be changed only while the sitting is planned; this one is ${sitting.state}.`),
  );

/** What an accommodation means for a candidate of a sitting, as columns. */
export const timeColumns = (minutes: number, allowance: Allowance = noAllowance) => ({
  seconds_allowed: secondsAllowed(minutes, allowance),
  need: needSays(allowance),
  rest_seconds_allowed: allowance.restMinutes * 60,
});

/** Puts the drawing of what papers are missing into the queue; they are drawn whole and only once. */
export async function queuePapers(context: LockingContext, sittingId: string): Promise<void> {
  const { missing, drawn } = await context.db
    .selectFrom('candidate as c').leftJoin('paper as p', 'p.candidate_id', 'c.id').where('c.sitting_id', '=', sittingId)
    .select([sql<number>`(count(*) filter (where p.candidate_id is null))::int`.as('missing'), sql<number>`count(p.candidate_id)::int`.as('drawn')])
    .executeTakeFirstOrThrow();
  const papers = missing > 0 ? 'drawing' : drawn > 0 ? 'drawn' : 'none';
  await context.db.updateTable('sitting').set({ papers, papers_drawn: drawn, papers_says: '' }).where('id', '=', sittingId).execute();
  if (missing > 0) await addJob(context.db, 'draw-papers', { sittingId }, { key: `draw-papers ${sittingId}`, heavy: true });
}
