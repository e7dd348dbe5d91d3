import { sql } from 'kysely';
import { accountId, type Context, holds } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { readsRecords } from '@/lib/results/relation';
import { isOpenToStudent } from '@/lib/results/rules';
import type { ResultState } from '@/lib/results/model';
import { newestResult } from '@/lib/results/store';

export type ReportFile = { name: string; pdf: Buffer };

/** A report's file: for a registrar, an instructor of the class, and the student whose report it is once the result is open to them. */
export async function readReport(context: Context, reportId: string): Promise<Result<ReportFile>> {
  if (!isId(reportId)) return notFound();
  const me = accountId(context.actor);
  const row = await context.db
    .selectFrom('report as r').innerJoin('candidate as c', 'c.id', 'r.candidate_id').innerJoin('sitting', 'sitting.id', 'c.sitting_id')
    .where('r.id', '=', reportId)
    .select((of) => [
      'r.pdf', 'r.issue', 'r.candidate_id', 'c.account_id',
      of.case().when(readsRecords(context.actor)).then(sql<boolean>`true`).else(sql<boolean>`false`).end().as('staff'),
    ])
    .executeTakeFirst();
  if (!row) return notFound();
  const own = holds(context.actor, 'student') && row.account_id === me;
  if (!row.staff && !(own && (await opened(context, row.candidate_id)))) return notFound();
  return done({ name: `grade-report-issue-${row.issue}.pdf`, pdf: row.pdf });
}

async function opened(context: Context, candidateId: string): Promise<boolean> {
  const result = await newestResult(context.db, candidateId);
  return result !== undefined && isOpenToStudent({ state: result.state as ResultState, withheld: result.withheld });
}
