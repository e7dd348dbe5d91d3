import { readdir, readFile } from 'node:fs/promises';
import path from 'node:path';
import { startCheck } from '@/lib/bank/check-commands';
import { bringInFiles } from '@/lib/bank/commands';
import { checkTemplateJob } from '@/lib/bank/jobs';
import { drawsForReview } from '@/lib/bank/model';
import { askForReview, decideReview } from '@/lib/bank/review-commands';
import type { Company } from './people';
import { must, type Stage } from './stage';

const folder = 'question-templates';
/** Left at an earlier point of their way, so that the bank shows every state. */
const stillDraft = new Set(['flux-step']);
const stillInReview = new Set(['shunt-field-rheostat']);

async function templateFiles(): Promise<{ name: string; text: string }[]> {
  const files: { name: string; text: string }[] = [];
  for (const area of (await readdir(folder, { withFileTypes: true })).filter((entry) => entry.isDirectory() && entry.name !== 'tables')) {
    for (const name of (await readdir(path.join(folder, area.name))).filter((file) => file.endsWith('.yaml')).sort()) {
      files.push({ name, text: await readFile(path.join(folder, area.name, name), 'utf8') });
    }
  }
  return files;
}

/** One template's way: checked over its draws, put before the second instructor, approved. */
async function prove({ db }: Stage, company: Company, slug: string): Promise<void> {
  const row = await db.selectFrom('template').select(['id', 'revision']).where('slug', '=', slug).executeTakeFirstOrThrow();
  const { checkId } = must(await startCheck(company.author, { id: row.id, draws: drawsForReview }), `check of ${slug}`);
  await checkTemplateJob(db, { checkId });
  if (stillDraft.has(slug)) return;
  const { versionId } = must(await askForReview(company.author, { id: row.id, revision: row.revision, note: '' }), `review of ${slug}`);
  if (stillInReview.has(slug)) return;
  must(await decideReview(company.reviewer, { versionId, verdict: 'approved', note: 'Worked through with three draws.' }), `approval of ${slug}`);
}

/** The author brings the templates in; each is checked and reviewed, two at a time. */
export async function fillBank(stage: Stage, company: Company): Promise<void> {
  const outcomes = must(await bringInFiles(company.author, await templateFiles()), 'bringing the templates in');
  const waiting = outcomes.map((outcome) => {
    if (!outcome.slug || outcome.outcome === 'refused') throw new Error(`Demo: ${outcome.name}: ${outcome.says}`);
    return outcome.slug;
  });
  let done = 0;
  const next = async (): Promise<void> => {
    for (let slug = waiting.shift(); slug !== undefined; slug = waiting.shift()) {
      await prove(stage, company, slug);
      done += 1;
      if (done % 7 === 0) stage.say(`  ${done} of ${outcomes.length} templates checked over ${drawsForReview} draws`);
    }
  };
  await Promise.all([next(), next()]);
}
