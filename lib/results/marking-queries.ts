import { type Context, holds } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { type FactsOf, sittingFacts } from './facts';
import { marksSitting, resultSittings } from './relation';
import { type Condition, releaseConditions } from './rules';
import type { Outcome, PartMark, ResultState } from './model';
import { newestMarks, newestResults, type MarkRow } from './store';

export type MarkingRow = { id: string; title: string; className: string; startsAt: Date; marks: number; facts: FactsOf };

/** Sittings that are over in the instructor's classes, latest first, with what is still to do. */
export async function markingLedger(context: Context): Promise<Result<MarkingRow[]>> {
  if (!holds(context.actor, 'instructor')) return notFound();
  const rows = await context.db
    .selectFrom('sitting').innerJoin('class', 'class.id', 'sitting.class_id').innerJoin('form', 'form.id', 'sitting.form_id')
    .where('sitting.state', 'in', resultSittings).where(marksSitting(context.actor))
    .select(['sitting.id', 'sitting.title', 'class.name as class_name', 'sitting.starts_at', 'form.marks'])
    .orderBy('sitting.starts_at', 'desc').execute();
  const facts = await sittingFacts(context.db, rows.map((row) => row.id));
  return done(rows.flatMap((row) => {
    const known = facts.get(row.id);
    return known ? [{ id: row.id, title: row.title, className: row.class_name, startsAt: row.starts_at, marks: Number(row.marks), facts: known }] : [];
  }));
}

export type MarkedCandidate = {
  id: string;
  name: string;
  learnerNumber: string | null;
  candidateState: string;
  /** Null while the paper is not marked. */
  result: { total: number; of: number; percent: number; outcome: Outcome; state: ResultState; withheld: boolean } | null;
  forMarker: number;
  unread: number;
  /** Marks that follow an earlier slip through. */
  carried: number;
  overridden: number;
};
export type OpenClaim = { candidateId: string; name: string; question: number; part: string; sequence: number; answer: string; typedAt: Date | null; receivedAt: Date };
export type Misstep = { says: string; count: number };
export type ItemRow = { question: number; part: string; of: number; answered: number; marked: number; meanShare: number; verdicts: Partial<Record<PartMark['verdict'], number>>; missteps: Misstep[] };
export type MarkingPage = {
  id: string; title: string; className: string; startsAt: Date; state: string; marks: number; releasedAt: Date | null;
  candidates: MarkedCandidate[]; claims: OpenClaim[]; items: ItemRow[]; conditions: Condition[]; facts: FactsOf;
};

const sittingRow = (context: Context, sittingId: string) =>
  context.db
    .selectFrom('sitting').innerJoin('class', 'class.id', 'sitting.class_id').innerJoin('form', 'form.id', 'sitting.form_id')
    .where('sitting.id', '=', sittingId).where('sitting.state', 'in', resultSittings).where(marksSitting(context.actor))
    .select(['sitting.id', 'sitting.title', 'class.name as class_name', 'sitting.starts_at', 'sitting.state', 'sitting.released_at', 'form.marks'])
    .executeTakeFirst();

const candidateRows = (context: Context, sittingId: string) =>
  context.db
    .selectFrom('candidate as c').innerJoin('account as a', 'a.id', 'c.account_id')
    .leftJoin(newestResults(context.db).as('r'), 'r.candidate_id', 'c.id')
    .where('c.sitting_id', '=', sittingId)
    .select(['c.id', 'c.state as candidate_state', 'a.name', 'a.learner_number', 'r.total', 'r.of', 'r.percent', 'r.outcome', 'r.state', 'r.withheld'])
    .orderBy('a.sort_name').orderBy('c.id').execute();
type CandidateRow = Awaited<ReturnType<typeof candidateRows>>[number];

function candidateOf(row: CandidateRow, marks: readonly MarkRow[]): MarkedCandidate {
  const own = marks.filter((mark) => mark.candidate_id === row.id);
  const count = (is: (mark: MarkRow) => boolean) => own.filter(is).length;
  return {
    id: row.id, name: row.name, learnerNumber: row.learner_number, candidateState: row.candidate_state,
    result: row.state === null ? null : {
      total: row.total ?? 0, of: row.of ?? 0, percent: row.percent ?? 0, outcome: row.outcome as Outcome, state: row.state as ResultState, withheld: row.withheld === true,
    },
    forMarker: count((mark) => mark.verdict === 'for-marker'), unread: count((mark) => mark.verdict === 'unread'),
    carried: count((mark) => mark.verdict === 'carried'), overridden: count((mark) => mark.marker_id !== null),
  };
}

const openClaims = async (context: Context, sittingId: string): Promise<OpenClaim[]> =>
  (await context.db
    .selectFrom('claim as l').innerJoin('candidate as c', 'c.id', 'l.candidate_id').innerJoin('account as a', 'a.id', 'c.account_id')
    .where('c.sitting_id', '=', sittingId).where('l.decision', 'is', null)
    .select(['c.id', 'a.name', 'l.question', 'l.part', 'l.sequence', 'l.answer', 'l.typed_at', 'l.received_at'])
    .orderBy('a.sort_name').orderBy('l.question').orderBy('l.part').orderBy('l.sequence').execute()
  ).map(({ id, typed_at: typedAt, received_at: receivedAt, ...claim }) => ({ ...claim, candidateId: id, typedAt, receivedAt }));

const commonest = 3;

/** How each part came out over all candidates: mean share of its marks, verdicts, commonest missteps. */
export function itemsOf(marks: readonly Pick<MarkRow, 'question' | 'part' | 'of' | 'awarded' | 'verdict' | 'says' | 'rule'>[]): ItemRow[] {
  type Counting = ItemRow & { sum: number; said: Map<string, number> };
  const items = new Map<string, Counting>();
  for (const mark of marks) {
    const key = `${mark.question} ${mark.part}`;
    const item: Counting = items.get(key) ?? { question: mark.question, part: mark.part, of: mark.of, answered: 0, marked: 0, meanShare: 0, verdicts: {}, missteps: [], sum: 0, said: new Map() };
    const verdict = mark.verdict as PartMark['verdict'];
    item.marked += 1;
    item.answered += verdict === 'blank' ? 0 : 1;
    item.sum += mark.awarded;
    item.verdicts[verdict] = (item.verdicts[verdict] ?? 0) + 1;
    if (verdict === 'misstep' && mark.rule !== 'person') item.said.set(mark.says, (item.said.get(mark.says) ?? 0) + 1);
    items.set(key, item);
  }
  return [...items.values()]
    .sort((a, b) => a.question - b.question || a.part.localeCompare(b.part))
    .map(({ sum, said, ...item }) => ({
      ...item, meanShare: sum / (item.marked * item.of),
      missteps: [...said].map(([says, count]) => ({ says, count })).sort((a, b) => b.count - a.count).slice(0, commonest),
    }));
}

/** A sitting to mark: its candidates, what waits for a person, how the parts came out, what stands in the way of a release. */
export async function markingPage(context: Context, sittingId: string): Promise<Result<MarkingPage>> {
  const row = isId(sittingId) ? await sittingRow(context, sittingId) : undefined;
  const facts = row && (await sittingFacts(context.db, [row.id])).get(row.id);
  if (!row || !facts) return notFound();
  const candidates = await candidateRows(context, row.id);
  const marks = await newestMarks(context.db, candidates.map((candidate) => candidate.id)).execute();
  return done({
    id: row.id, title: row.title, className: row.class_name, startsAt: row.starts_at, state: row.state, marks: Number(row.marks), releasedAt: row.released_at,
    candidates: candidates.map((candidate) => candidateOf(candidate, marks)), claims: await openClaims(context, row.id),
    items: itemsOf(marks), conditions: releaseConditions(facts), facts,
  });
}
