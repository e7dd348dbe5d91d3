import type { Kysely, Transaction } from 'kysely';
import type { DB } from '@/db/types';
import { canonical } from '@/lib/audit/model';
import { endedStates, type CandidateState } from '@/lib/candidates/model';
import type { Actor, LockingContext } from '@/lib/context';
import { readContent } from '@/lib/exams/queries';
import { markQuestion } from '@/lib/marking/mark';
import type { MarkingPolicy } from '@/lib/marking/policy';
import type { Draw } from '@/lib/templates/draw';
import type { PartMarking } from '@/lib/templates/kinds/kind';
import { PaperTemplates } from './paper-templates';
import { renewResult } from './result-of';
import { nextResult, type ResultFacts } from './rules';
import { asMarks, type MarkRow, newestResult, type NewMark, storeMarks } from './store';

const marker: Actor = { kind: 'system', name: 'mark-paper' };

/** `waiting`: the paper is not ended. `settled`: the result is released or sealed, so that marking changes nothing any more. */
export type MarkOutcome = 'marked' | 'unchanged' | 'waiting' | 'settled';

type Answers = Map<number, Record<string, string>>;

/** What counts as answered: the last revision of each part, among them what came after the end and was taken. */
async function answersOf(db: Transaction<DB>, candidateId: string): Promise<Answers> {
  const rows = await db
    .selectFrom('response').where('candidate_id', '=', candidateId).select(['question', 'part', 'sequence', 'answer'])
    .unionAll(db.selectFrom('claim').where('candidate_id', '=', candidateId).where('decision', '=', 'taken').select(['question', 'part', 'sequence', 'answer']))
    .orderBy('sequence')
    .execute();
  const answers: Answers = new Map();
  for (const { question, part, answer } of rows) answers.set(question, { ...answers.get(question), [part]: answer });
  return answers;
}

/** The newest mark of each part, and the newest one that was automatic. */
async function earlierMarks(db: Transaction<DB>, candidateId: string) {
  const rows = await db.selectFrom('mark').selectAll().where('candidate_id', '=', candidateId).orderBy('issue').execute();
  const newest = new Map<string, MarkRow>();
  const automatic = new Map<string, MarkRow>();
  for (const row of rows) {
    newest.set(`${row.question} ${row.part}`, row);
    if (row.marker_id === null) automatic.set(`${row.question} ${row.part}`, row);
  }
  return { newest, automatic };
}

const said = ({ awarded, of, verdict, rule, key, says, reads }: Omit<PartMarking, 'part'> | (Pick<MarkRow, 'awarded' | 'of' | 'verdict' | 'rule' | 'key' | 'says' | 'reads'>), answer: string): string =>
  canonical(JSON.parse(JSON.stringify([asMarks(awarded), of, verdict, rule, key, says, reads ?? null, answer])));

type Earlier = Awaited<ReturnType<typeof earlierMarks>>;

/** The mark to add for one part; null where it is there already, or a person decided on this very answer. */
function newMark(question: number, marking: PartMarking, answer: string, { newest, automatic }: Earlier): NewMark | null {
  const place = `${question} ${marking.part}`;
  const last = newest.get(place);
  const own = automatic.get(place);
  if (last && last.marker_id !== null && last.answer === answer) return null;
  if (last && last === own && said(own, own.answer) === said(marking, answer)) return null;
  return { question, issue: (last?.issue ?? 0) + 1, answer, marking };
}

async function markAnswers(context: LockingContext, candidateId: string, policy: MarkingPolicy, templates: PaperTemplates): Promise<number> {
  const keys = await context.db.selectFrom('paper_key').where('candidate_id', '=', candidateId).select(['question', 'template_version_id', 'draw']).orderBy('question').execute();
  const read = await templates.of(keys.map((key) => key.template_version_id));
  const answers = await answersOf(context.db, candidateId);
  const earlier = await earlierMarks(context.db, candidateId);
  const marks = keys.flatMap(({ question, template_version_id: version, draw }): NewMark[] => {
    const template = read.get(version);
    if (!template) throw new Error(`Question ${question} was drawn from a version that is not in the bank.`);
    const given = answers.get(question) ?? {};
    const { parts } = markQuestion(template, draw as unknown as Draw, given, policy);
    return parts.flatMap((marking) => newMark(question, marking, given[marking.part] ?? '', earlier) ?? []);
  });
  await storeMarks(context, candidateId, marks);
  return marks.length;
}

const lockCandidate = (db: Transaction<DB>, candidateId: string) =>
  db
    .selectFrom('candidate as c').innerJoin('sitting as s', 's.id', 'c.sitting_id').innerJoin('form as f', 'f.id', 's.form_id')
    .where('c.id', '=', candidateId).select(['c.id', 'c.state', 'c.started_at', 's.state as sitting_state', 'f.content']).forUpdate('c').executeTakeFirst();

/** Never came, was turned away, or left before the start. */
const didNotSit = (candidate: { state: string; started_at: Date | null }): boolean =>
  candidate.state === 'absent' || candidate.state === 'refused' || (candidate.state === 'withdrawn' && candidate.started_at === null);

/** As `markPaper`, in a transaction that is open. */
export async function markPaperIn(trx: Transaction<DB>, candidateId: string, templates: PaperTemplates): Promise<MarkOutcome> {
  const context: LockingContext = { db: trx, actor: marker };
  const candidate = await lockCandidate(trx, candidateId);
  if (!candidate) return 'waiting';
  const absent = didNotSit(candidate);
  if (absent ? !['closed', 'reconciled'].includes(candidate.sitting_state) : !endedStates.includes(candidate.state as CandidateState)) return 'waiting';
  const before = await newestResult(trx, candidateId);
  const facts: ResultFacts = before ? { state: before.state as ResultFacts['state'], withheld: before.withheld } : { state: 'provisional', withheld: false };
  if (!nextResult(facts, 'mark').ok) return 'settled';
  const changed = absent ? 0 : await markAnswers(context, candidateId, readContent(candidate.content).marking, templates);
  const next: ResultFacts = changed > 0 || !before ? { ...facts, state: 'provisional' } : facts;
  const renewed = await renewResult(context, candidateId, before, next, { sat: !absent, why: '' });
  return changed > 0 || renewed ? 'marked' : 'unchanged';
}

/**
 * Marks one ended paper from its stored draws, in one transaction, and stores the result. Marking again with the same outcome
 * writes nothing; a person's decision on an answer stands. For the job that hand-in, time-out and closing have queued.
 */
export const markPaper = (db: Kysely<DB>, candidateId: string, templates = new PaperTemplates(db)): Promise<MarkOutcome> =>
  db.transaction().execute((trx) => markPaperIn(trx, candidateId, templates));

/** Marks every ended paper of a sitting, one transaction a paper; those who never sat get their result too. */
export async function markSitting(db: Kysely<DB>, sittingId: string, signal?: AbortSignal): Promise<Record<MarkOutcome, number>> {
  const done: Record<MarkOutcome, number> = { marked: 0, unchanged: 0, waiting: 0, settled: 0 };
  const templates = new PaperTemplates(db);
  for (const { id } of await db.selectFrom('candidate').select('id').where('sitting_id', '=', sittingId).orderBy('id').execute()) {
    signal?.throwIfAborted();
    done[await markPaper(db, id, templates)] += 1;
  }
  return done;
}
