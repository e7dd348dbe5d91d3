import type { Kysely } from 'kysely';
import type { DB } from '@/db/types';
import { accountId, type Context, holds } from '@/lib/context';
import type { PaperContent } from '@/lib/exams/paper';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import type { Draw } from '@/lib/templates/draw';
import type { Question } from '@/lib/templates/question';
import { solutionHtml } from '@/lib/templates/solution';
import type { PartMark, ResultState, Totals } from './model';
import { PaperTemplates } from './paper-templates';
import { marksSitting, resultSittings } from './relation';
import { isOpenToStudent } from './rules';
import { newestResult, type ResultRow, totalsIn } from './store';

export type MarkedQuestion = { number: number; section: string; question: Question; marks: PartMark[]; awarded: number; of: number };
export type ShownResult = Totals & { state: ResultState; withheld: boolean; issue: number; at: Date; why: string };

const shownResult = (row: ResultRow): ShownResult => ({
  ...totalsIn(row), state: row.state as ResultState, withheld: row.withheld, issue: row.issue, at: row.at, why: row.why,
});

async function marksOf(db: Kysely<DB>, candidateId: string): Promise<PartMark[]> {
  const rows = await db
    .selectFrom('mark as m').leftJoin('account as a', 'a.id', 'm.marker_id').distinctOn(['m.question', 'm.part'])
    .where('m.candidate_id', '=', candidateId)
    .select(['m.question', 'm.part', 'm.issue', 'm.awarded', 'm.of', 'm.verdict', 'm.rule', 'm.answer', 'm.reads', 'm.key', 'm.says', 'm.reason', 'a.name as marker'])
    .orderBy('m.question').orderBy('m.part').orderBy('m.issue', 'desc').execute();
  return rows.map((row) => ({
    ...row, verdict: row.verdict as PartMark['verdict'], marker: row.marker ?? '',
    reads: row.reads as unknown as PartMark['reads'], key: row.key as unknown as PartMark['key'],
  }));
}

const numbers = (marks: readonly PartMark[], pick: (mark: PartMark) => number): number => marks.reduce((sum, mark) => sum + Math.round(pick(mark) * 100), 0) / 100;

/** The paper as the candidate saw it, question by question, with its marks. */
async function markedQuestions(db: Kysely<DB>, candidateId: string): Promise<MarkedQuestion[]> {
  const paper = await db.selectFrom('paper').select('content').where('candidate_id', '=', candidateId).executeTakeFirst();
  if (!paper) return [];
  const content = paper.content as unknown as PaperContent;
  const marks = await marksOf(db, candidateId);
  return content.questions.map((question, index) => {
    const own = marks.filter((mark) => mark.question === index + 1);
    const section = content.sections.find(({ first, last }) => index + 1 >= first && index + 1 <= last);
    return { number: index + 1, section: section?.title ?? '', question, marks: own, awarded: numbers(own, (mark) => mark.awarded), of: question.marks };
  });
}

export type CandidatePaper = {
  candidateId: string; name: string; learnerNumber: string | null; seat: string; candidateState: string;
  sitting: { id: string; title: string }; result: ShownResult | null; questions: MarkedQuestion[];
  /** The candidates before and after, in the order of the ledger. */
  neighbours: { before: string | null; after: string | null };
  mayOverride: boolean;
};

async function neighboursOf(db: Kysely<DB>, sittingId: string, candidateId: string) {
  const rows = await db
    .selectFrom('candidate as c').innerJoin('account as a', 'a.id', 'c.account_id').innerJoin('paper as p', 'p.candidate_id', 'c.id')
    .where('c.sitting_id', '=', sittingId).where('c.state', 'not in', ['absent', 'refused']).select('c.id').orderBy('a.sort_name').orderBy('c.id').execute();
  const at = rows.findIndex((row) => row.id === candidateId);
  return { before: (at > 0 && rows[at - 1]?.id) || null, after: rows[at + 1]?.id ?? null };
}

/** One marked paper for an instructor of the class, keys and rules with it. */
export async function candidatePaper(context: Context, sittingId: string, candidateId: string): Promise<Result<CandidatePaper>> {
  if (!isId(sittingId) || !isId(candidateId)) return notFound();
  const row = await context.db
    .selectFrom('candidate as c').innerJoin('sitting', 'sitting.id', 'c.sitting_id').innerJoin('account as a', 'a.id', 'c.account_id')
    .where('c.id', '=', candidateId).where('sitting.id', '=', sittingId).where('sitting.state', 'in', resultSittings).where(marksSitting(context.actor))
    .select(['c.id', 'c.seat', 'c.state', 'a.name', 'a.learner_number', 'sitting.id as sitting_id', 'sitting.title']).executeTakeFirst();
  if (!row) return notFound();
  const result = await newestResult(context.db, row.id);
  return done({
    candidateId: row.id, name: row.name, learnerNumber: row.learner_number, seat: row.seat, candidateState: row.state,
    sitting: { id: row.sitting_id, title: row.title }, result: result ? shownResult(result) : null,
    questions: await markedQuestions(context.db, row.id), neighbours: await neighboursOf(context.db, row.sitting_id, row.id),
    mayOverride: result !== undefined && ['provisional', 'moderated', 'released'].includes(result.state),
  });
}

export type OwnResult = { candidateId: string; title: string; startsAt: Date; open: boolean; state: ResultState | null; outcome: Totals['outcome'] | null; total: number | null; of: number | null };

/** A student's own sittings that are over. Of a result that is not released only that there is none yet. */
export async function ownResults(context: Context): Promise<OwnResult[]> {
  const me = accountId(context.actor);
  if (!me || !holds(context.actor, 'student')) return [];
  const rows = await context.db
    .selectFrom('candidate as c').innerJoin('sitting as s', 's.id', 'c.sitting_id')
    .where('c.account_id', '=', me).where('s.state', 'in', resultSittings)
    .select(['c.id', 's.title', 's.starts_at']).orderBy('s.starts_at', 'desc').execute();
  return Promise.all(rows.map(async (row) => {
    const result = await newestResult(context.db, row.id);
    const open = result !== undefined && isOpenToStudent({ state: result.state as ResultState, withheld: result.withheld });
    const shown = open ? { state: result.state as ResultState, outcome: result.outcome as Totals['outcome'], total: result.total, of: result.of } : { state: null, outcome: null, total: null, of: null };
    return { candidateId: row.id, title: row.title, startsAt: row.starts_at, open, ...shown };
  }));
}

export type OwnPaper = { candidateId: string; title: string; startsAt: Date; room: string; result: ShownResult; questions: (MarkedQuestion & { solutionHtml: string })[]; report: { id: string; issue: number } | null };

/** The student's own marked paper with keys and solutions in own numbers; not found until it is released. */
export async function ownPaper(context: Context, candidateId: string): Promise<Result<OwnPaper>> {
  const me = accountId(context.actor);
  if (!me || !holds(context.actor, 'student') || !isId(candidateId)) return notFound();
  const { db } = context;
  const row = await db
    .selectFrom('candidate as c').innerJoin('sitting as s', 's.id', 'c.sitting_id')
    .where('c.id', '=', candidateId).where('c.account_id', '=', me).where('s.state', 'in', resultSittings)
    .select(['c.id', 's.title', 's.starts_at', 's.room']).executeTakeFirst();
  const result = row && (await newestResult(db, row.id));
  // Nothing of keys is asked for before this line.
  if (!row || !result || !isOpenToStudent({ state: result.state as ResultState, withheld: result.withheld })) return notFound();
  const sat = result.outcome !== 'absent';
  const questions = sat ? await withSolutions(db, row.id) : [];
  const report = await db.selectFrom('report').select(['id', 'issue']).where('candidate_id', '=', row.id).orderBy('issue', 'desc').limit(1).executeTakeFirst();
  return done({ candidateId: row.id, title: row.title, startsAt: row.starts_at, room: row.room, result: shownResult(result), questions, report: report ?? null });
}

async function withSolutions(db: Kysely<DB>, candidateId: string): Promise<OwnPaper['questions']> {
  const keys = await db.selectFrom('paper_key').select(['question', 'template_version_id', 'draw']).where('candidate_id', '=', candidateId).execute();
  const templates = await new PaperTemplates(db).of(keys.map((key) => key.template_version_id));
  return (await markedQuestions(db, candidateId)).map((question) => {
    const key = keys.find((one) => one.question === question.number);
    const template = key && templates.get(key.template_version_id);
    return { ...question, solutionHtml: key && template ? solutionHtml(template, key.draw as unknown as Draw) : '' };
  });
}
