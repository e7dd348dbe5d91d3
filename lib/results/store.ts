import { createHash } from 'node:crypto';
import type { Kysely, Selectable } from 'kysely';
import type { DB, Mark, Report, Result as ResultTable } from '@/db/types';
import { rowDigest } from '@/lib/audit/model';
import { record } from '@/lib/audit/commands';
import { accountId, type LockingContext } from '@/lib/context';
import type { PartMarking } from '@/lib/templates/kinds/kind';
import type { Totals } from './model';
import type { ResultFacts } from './rules';

export type MarkRow = Selectable<Mark>;
export type ResultRow = Selectable<ResultTable>;
export type ReportRow = Selectable<Report>;

/** A row as the log binds it: times as ISO text, files by their SHA-256. */
export function digestOfRow(row: MarkRow | ResultRow | ReportRow): string {
  const plain = Object.entries(row).map(([column, value]: [string, unknown]) => {
    if (value instanceof Date) return [column, value.toISOString()];
    return [column, Buffer.isBuffer(value) ? createHash('sha256').update(value).digest('hex') : value];
  });
  return rowDigest(Object.fromEntries(plain));
}

/** How a row is called in the log, before its digest. */
export const markName = (row: Pick<MarkRow, 'question' | 'part' | 'issue'>): string => `mark ${row.question} ${row.part} ${row.issue}`;
export const resultName = (row: Pick<ResultRow, 'issue'>): string => `result ${row.issue}`;
export const reportName = (row: Pick<ReportRow, 'issue'>): string => `report ${row.issue}`;
const logged = (name: string, row: MarkRow | ResultRow | ReportRow): string => `${name} ${digestOfRow(row)}`;

/** The marks that count now: the newest issue of each part, in the order of the paper. */
export const newestMarks = (db: Kysely<DB>, candidateIds: readonly string[]) =>
  db
    .selectFrom('mark')
    .distinctOn(['candidate_id', 'question', 'part'])
    .selectAll()
    .where('candidate_id', 'in', candidateIds.length > 0 ? [...candidateIds] : [noId])
    .orderBy('candidate_id')
    .orderBy('question')
    .orderBy('part')
    .orderBy('issue', 'desc');
const noId = '00000000-0000-0000-0000-000000000000';

/** The newest result of each candidate, as a table to join. */
export const newestResults = (db: Kysely<DB>) => db.selectFrom('result').distinctOn('candidate_id').selectAll().orderBy('candidate_id').orderBy('issue', 'desc');

export const newestResult = (db: Kysely<DB>, candidateId: string): Promise<ResultRow | undefined> =>
  db.selectFrom('result').selectAll().where('candidate_id', '=', candidateId).orderBy('issue', 'desc').limit(1).executeTakeFirst();

export type NewMark = {
  question: number;
  issue: number;
  answer: string;
  marking: Pick<PartMarking, 'part' | 'awarded' | 'of' | 'verdict' | 'rule' | 'key' | 'says'> & { reads?: PartMarking['reads'] | null };
  marker?: { id: string; reason: string };
};

/** Two decimals: what a mark is kept with. */
export const asMarks = (marks: number): number => Math.round(marks * 100) / 100;

/** Appends marks of one candidate and binds each row in the log. */
export async function storeMarks(context: LockingContext, candidateId: string, marks: readonly NewMark[]): Promise<void> {
  if (marks.length === 0) return;
  const rows = await context.db
    .insertInto('mark')
    .values(marks.map(({ question, issue, answer, marking, marker }) => ({
      candidate_id: candidateId, question, part: marking.part, issue, awarded: asMarks(marking.awarded), of: marking.of, verdict: marking.verdict,
      rule: marking.rule, answer, reads: marking.reads ? JSON.stringify(marking.reads) : null, key: JSON.stringify(marking.key), says: marking.says,
      ...(marker ? { marker_id: marker.id, reason: marker.reason } : {}),
    })))
    .returningAll()
    .execute();
  await record(context, { kind: 'marks.awarded', subject: 'candidate', subjectId: candidateId, data: { rows: rows.map((row) => logged(markName(row), row)) } });
}

/** Appends a result as the next issue and binds its row in the log. */
export async function storeResult(
  context: LockingContext, candidateId: string, before: ResultRow | undefined, now: Totals & ResultFacts, why: string,
): Promise<ResultRow> {
  const { total, of, percent, outcome, breakdown, rule, state, withheld } = now;
  const row = await context.db
    .insertInto('result')
    .values({
      candidate_id: candidateId, issue: (before?.issue ?? 0) + 1, state, withheld, total, of, percent, outcome,
      breakdown: JSON.stringify(breakdown), rule: JSON.stringify(rule), why, made_by: accountId(context.actor),
    })
    .returningAll()
    .executeTakeFirstOrThrow();
  await record(context, { kind: `result.${state}`, subject: 'candidate', subjectId: candidateId, data: { rows: [logged(resultName(row), row)], withheld } });
  return row;
}

/** Binds the row of a new report in the log. */
export const logReport = (context: LockingContext, row: ReportRow): Promise<void> =>
  record(context, { kind: 'report.issued', subject: 'candidate', subjectId: row.candidate_id, data: { rows: [logged(reportName(row), row)], report: row.id } });

/** A stored result's figures, for the next issue or for a document. */
export const totalsIn = (row: ResultRow): Totals => ({
  total: row.total, of: row.of, percent: row.percent, outcome: row.outcome as Totals['outcome'],
  breakdown: row.breakdown as unknown as Totals['breakdown'], rule: row.rule as unknown as Totals['rule'],
});
