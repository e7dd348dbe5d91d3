import { createHash } from 'node:crypto';
import type { Kysely, Transaction } from 'kysely';
import type { DB } from '@/db/types';
import { canonical } from '@/lib/audit/model';
import { record } from '@/lib/audit/commands';
import type { Actor } from '@/lib/context';
import { assemblePaper } from '@/lib/exams/assemble';
import type { ExamContent } from '@/lib/exams/model';
import { readContent } from '@/lib/exams/queries';
import { type ReadVersion, readVersions } from '@/lib/exams/templates';
import { done, refuse, type Result } from '@/lib/result';
import { type Draw, drawTemplate, engine } from '@/lib/templates/draw';
import { toQuestion } from '@/lib/templates/question';
import { givensOf, keysOf, newestDraw, seedOf } from './draws';

const drawer: Actor = { kind: 'system', name: 'draw-papers' };

type Form = { id: string; title: string; content: ExamContent; questions: readonly ReadVersion[] };
type Job = { sittingId: string; secret: Uint8Array; form: Form };

async function load(db: Kysely<DB>, sittingId: string): Promise<Result<Job> | null> {
  const row = await db
    .selectFrom('sitting as s').innerJoin('form as f', 'f.id', 's.form_id').where('s.id', '=', sittingId).where('s.state', '=', 'planned')
    .select(['s.secret', 'f.id', 'f.title', 'f.content']).executeTakeFirst();
  if (!row) return null;
  const items = await db.selectFrom('form_item').where('form_id', '=', row.id).select('template_version_id').orderBy('question').execute();
  const questions = await readVersions({ db }, items.map((item) => item.template_version_id));
  if (!questions.ok) return questions;
  return done({ sittingId, secret: row.secret, form: { id: row.id, title: row.title, content: readContent(row.content), questions: questions.value } });
}

/** Keys and givens that the student was given before, in whatever sitting, by template. */
async function hadBefore(trx: Transaction<DB>, accountId: string, templateIds: readonly string[]) {
  const rows = await trx
    .selectFrom('paper_key as k').innerJoin('candidate as c', 'c.id', 'k.candidate_id').innerJoin('template_version as v', 'v.id', 'k.template_version_id')
    .where('c.account_id', '=', accountId).where('v.template_id', 'in', [...templateIds]).select(['v.template_id', 'k.draw']).execute();
  const had = new Map<string, { keys: Set<string>; givens: Set<string> }>();
  for (const row of rows) {
    const draw = row.draw as unknown as Draw;
    const of = had.get(row.template_id) ?? { keys: new Set<string>(), givens: new Set<string>() };
    of.keys.add(keysOf(draw));
    of.givens.add(givensOf(draw));
    had.set(row.template_id, of);
  }
  return had;
}

/** Keys that the papers of this sitting have by question; papers drawn meanwhile are added to it. */
async function neighboursOf(db: Kysely<DB>, sittingId: string): Promise<Map<number, Set<string>>> {
  const rows = await db
    .selectFrom('paper_key as k').innerJoin('candidate as c', 'c.id', 'k.candidate_id').where('c.sitting_id', '=', sittingId).select(['k.question', 'k.draw']).execute();
  const keys = new Map<number, Set<string>>();
  for (const row of rows) keys.set(row.question, (keys.get(row.question) ?? new Set()).add(keysOf(row.draw as unknown as Draw)));
  return keys;
}

type Candidate = { id: string; accountId: string };
type Drawn = { draw: Draw; version: ReadVersion }[];

class NoDraw extends Error {}

async function drawFor(trx: Transaction<DB>, job: Job, candidate: Candidate, neighbours: ReadonlyMap<number, ReadonlySet<string>>): Promise<Drawn> {
  const { questions, content } = job.form;
  const had = await hadBefore(trx, candidate.accountId, questions.map((question) => question.templateId));
  const none: ReadonlySet<string> = new Set();
  return questions.map((version, index) => {
    const question = index + 1;
    const drawAt = (attempt: number): Draw => {
      const draw = drawTemplate(version.template, seedOf(job.secret, candidate.id, question, attempt), { locale: content.locale });
      if (!draw.ok) throw new NoDraw(`“${version.title}”: ${draw.says}`);
      return draw.value;
    };
    const before = had.get(version.templateId);
    return { version, draw: newestDraw(drawAt, { keys: before?.keys ?? none, givens: before?.givens ?? none, neighbours: neighbours.get(question) ?? none }).draw };
  });
}

async function store(trx: Transaction<DB>, job: Job, candidate: Candidate, drawn: Drawn): Promise<void> {
  const { form } = job;
  const content = assemblePaper(form.title, form.content, drawn.map(({ version, draw }) => toQuestion(version.template, draw)));
  await trx
    .insertInto('paper')
    .values({
      candidate_id: candidate.id, form_id: form.id, engine, locale: form.content.locale, questions: drawn.length,
      parts: content.questions.reduce((sum, question) => sum + question.parts.length, 0),
      content: JSON.stringify(content), digest: createHash('sha256').update(canonical(content)).digest('hex'),
    })
    .execute();
  await trx
    .insertInto('paper_key')
    .values(drawn.map(({ version, draw }, index) => ({ candidate_id: candidate.id, question: index + 1, template_version_id: version.versionId, seed: draw.seed, draw: JSON.stringify(draw) })))
    .execute();
}

/** Draws the next paper that is missing, whole, in one transaction; null when none is missing or the plan is no longer open. */
async function drawNext(db: Kysely<DB>, job: Job, neighbours: Map<number, Set<string>>): Promise<Drawn | null> {
  return db.transaction().execute(async (trx) => {
    const open = await trx.selectFrom('sitting').where('id', '=', job.sittingId).where('state', '=', 'planned').select('id').forUpdate().executeTakeFirst();
    if (!open) return null;
    const row = await trx
      .selectFrom('candidate as c').leftJoin('paper as p', 'p.candidate_id', 'c.id').where('c.sitting_id', '=', job.sittingId).where('p.candidate_id', 'is', null)
      .select(['c.id', 'c.account_id']).orderBy('c.id').limit(1).executeTakeFirst();
    if (!row) {
      await finish(trx, job.sittingId);
      return null;
    }
    const candidate = { id: row.id, accountId: row.account_id };
    const drawn = await drawFor(trx, job, candidate, neighbours);
    await store(trx, job, candidate, drawn);
    await trx.updateTable('sitting').set((eb) => ({ papers: 'drawing', papers_drawn: eb('papers_drawn', '+', 1), papers_says: '' })).where('id', '=', job.sittingId).execute();
    return drawn;
  });
}

async function finish(trx: Transaction<DB>, sittingId: string): Promise<void> {
  const { papers } = await trx
    .selectFrom('paper as p').innerJoin('candidate as c', 'c.id', 'p.candidate_id').where('c.sitting_id', '=', sittingId)
    .select(({ fn }) => fn.countAll<number>().as('papers')).executeTakeFirstOrThrow();
  const changed = await trx
    .updateTable('sitting').set({ papers: papers > 0 ? 'drawn' : 'none', papers_drawn: papers, papers_says: '' })
    .where('id', '=', sittingId).where('papers', 'in', ['drawing', 'failed', 'none']).returning('id').executeTakeFirst();
  if (changed && papers > 0) await record({ db: trx, actor: drawer }, { kind: 'sitting.papers-drawn', subject: 'sitting', subjectId: sittingId, data: { papers } });
}

const fail = (db: Kysely<DB>, sittingId: string, says: string) =>
  db.updateTable('sitting').set({ papers: 'failed', papers_says: says }).where('id', '=', sittingId).where('state', '=', 'planned').execute();

/**
 * Draws and stores the papers that a planned sitting lacks, one transaction a paper, so that a worker killed in the middle
 * loses nothing and doing it again changes nothing. A draw repeats neither what the student ever had of the template nor, where
 * the template has values enough, what another paper of the sitting has. What cannot be drawn is said on the sitting's page.
 */
export async function drawPapers(db: Kysely<DB>, { sittingId }: { sittingId: string }, signal?: AbortSignal): Promise<Result<{ drawn: number }>> {
  const job = await load(db, sittingId);
  if (job === null) return done({ drawn: 0 });
  if (!job.ok) {
    await fail(db, sittingId, job.says);
    return job;
  }
  const neighbours = await neighboursOf(db, sittingId);
  for (let drawn = 0; ; drawn += 1) {
    signal?.throwIfAborted();
    try {
      const paper = await drawNext(db, job.value, neighbours);
      if (paper === null) return done({ drawn });
      paper.forEach(({ draw }, index) => neighbours.set(index + 1, (neighbours.get(index + 1) ?? new Set()).add(keysOf(draw))));
    } catch (error) {
      if (!(error instanceof NoDraw)) throw error;
      await fail(db, sittingId, error.message);
      return refuse('no-draw', error.message);
    }
  }
}
