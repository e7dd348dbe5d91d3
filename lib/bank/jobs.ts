import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import { runSandboxed, type SandboxRefusal } from './sandbox';
import type { Answers } from './sandbox-tasks';
import type { Result } from '@/lib/result';

const between = 250;
const patience = 60_000;

/**
 * Takes the check up, also again after a worker was killed in the middle of it: draws are told by their seeds, so
 * beginning once more finds the same. Answers the text and the draws, or null when there is nothing to do.
 */
async function takeUp(db: Kysely<DB>, checkId: string): Promise<{ text: string; draws: number } | null> {
  const taken = await db
    .updateTable('template_check')
    .set({ state: 'running', done: 0 })
    .where('id', '=', checkId)
    .where('state', 'in', ['queued', 'running'])
    .returning(['text', 'draws'])
    .executeTakeFirst();
  return taken ?? null;
}

/** Stores how far the check is; false when it was cancelled meanwhile. */
async function storeProgress(db: Kysely<DB>, checkId: string, count: number): Promise<boolean> {
  const stored = await db.updateTable('template_check').set({ done: count }).where('id', '=', checkId).where('state', '=', 'running').returning('id').executeTakeFirst();
  return stored !== undefined;
}

async function finish(db: Kysely<DB>, checkId: string, outcome: { state: string; says?: string; report?: unknown; done?: number }): Promise<void> {
  const { state, says = '', report, done } = outcome;
  await db
    .updateTable('template_check')
    .set({ state, says, ended_at: sql`app.now()`, ...(done === undefined ? {} : { done }), ...(report === undefined ? {} : { report: JSON.stringify(report) }) })
    .where('id', '=', checkId)
    .where('state', '=', 'running')
    .execute();
}

async function conclude(db: Kysely<DB>, checkId: string, draws: number, answer: Result<Answers['check'], SandboxRefusal>): Promise<void> {
  if (!answer.ok) {
    if (answer.code !== 'cancelled') await finish(db, checkId, { state: 'failed', says: answer.says });
    return;
  }
  const { report, problems } = answer.value;
  if (!report) return finish(db, checkId, { state: 'problems', says: 'The text does not read.', report: { ok: false, problems } });
  await finish(db, checkId, { state: report.ok ? 'in order' : 'problems', report, done: draws });
}

/**
 * Runs a check that was asked for: draws in the sandbox, at most four stored signs of progress a second, ended as soon
 * as one of them finds the check cancelled. `signal` is the worker's: it is going down, and the check stays to be taken up again.
 */
export async function checkTemplateJob(db: Kysely<DB>, payload: { checkId: string }, signal?: AbortSignal): Promise<void> {
  const check = await takeUp(db, payload.checkId);
  if (!check) return;
  const stop = new AbortController();
  const down = () => stop.abort();
  signal?.addEventListener('abort', down);
  let latest = 0;
  let storing = Promise.resolve();
  const watch = setInterval(() => {
    storing = storing.then(async () => {
      if (!(await storeProgress(db, payload.checkId, latest))) stop.abort();
    }).catch(() => undefined);
  }, between);
  try {
    const answer = await runSandboxed({ kind: 'check', text: check.text, draws: check.draws }, { stall: patience, signal: stop.signal, onProgress: (count) => (latest = count) });
    clearInterval(watch);
    await storing;
    if (signal?.aborted) throw new Error('The worker is going down; the check is taken up again.');
    await conclude(db, payload.checkId, check.draws, answer);
  } finally {
    clearInterval(watch);
    signal?.removeEventListener('abort', down);
  }
}
