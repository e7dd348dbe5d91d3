import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { canonical } from '@/lib/audit/model';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { type DecisionInput, drawsForReview, type ReviewInput, type TemplateState } from './model';
import { isAuthor, mayDecide, mayUseBank } from './policy';
import { readWhole, type WholeReading } from './reading';
import { nextState } from './rules';
import { lockTemplate, type LockedTemplate } from './store';

type Moved = { id: string; slug: string; state: TemplateState };

/** Stores the state that `nextState` gave. */
async function settle(context: LockingContext, row: LockedTemplate, state: TemplateState): Promise<Result<Moved>> {
  const writers = state === 'approved' ? { writers: [] } : {};
  await context.db.updateTable('template').set({ state, ...writers }).where('id', '=', row.id).execute();
  return done({ id: row.id, slug: row.slug, state });
}

/** The newest check of exactly this text with today's tables, cautions and engine, if it made draws enough and found it in order. */
async function checkedInOrder(context: LockingContext, templateId: string, digest: string): Promise<boolean> {
  const check = await context.db
    .selectFrom('template_check')
    .where('template_id', '=', templateId)
    .where('text_digest', '=', digest)
    .where('draws', '>=', drawsForReview)
    .where('state', 'in', ['in order', 'problems'])
    .orderBy('asked_at', 'desc')
    .select('state')
    .executeTakeFirst();
  return check?.state === 'in order';
}

async function makeVersion(context: LockingContext, row: LockedTemplate, read: WholeReading): Promise<{ id: string; number: number }> {
  const { slug: _slug, cautions: _cautions, ...printed } = read.facts;
  const author = row.changed_by ?? accountId(context.actor);
  if (!author) throw new Error('A version needs an author.');
  return context.db
    .insertInto('template_version')
    .values({
      ...printed, template_id: row.id, number: row.versions + 1, text: row.text, author_id: author, writers: row.writers,
      engine: read.digests.engine, digests: JSON.stringify(read.digests),
    })
    .returning(['id', 'number'])
    .executeTakeFirstOrThrow();
}

function reviewable(row: LockedTemplate | null, input: ReviewInput, slug: string, text: string): Result<LockedTemplate> {
  if (!row) return notFound();
  if (row.revision !== input.revision || row.text !== text) return refuse('changed-since', 'The text was saved again meanwhile. Load the page again, then ask for the review.');
  if (slug !== row.slug) return refuse('slug', `The text says "template: ${slug}", but this template is ${row.slug}: write that into its first line.`);
  return done(row);
}

/**
 * Puts the stored text before a second instructor: makes an unchangeable version of it, with the digests of all it
 * rests on. Refused with `not-checked` unless a check of exactly this text over at least 2,000 draws is in order.
 */
export async function askForReview(context: Context, input: ReviewInput): Promise<Result<Moved & { versionId: string; number: number }>> {
  const asker = accountId(context.actor);
  if (!mayUseBank(context.actor) || !asker) return notFound();
  const stored = await context.db.selectFrom('template').select('text').where('id', '=', input.id).executeTakeFirst();
  if (!stored) return notFound();
  const whole = await readWhole(stored.text);
  if (!whole.ok) return whole;
  const { facts, digest } = whole.value;
  return inTransaction(context, async (locked): Promise<Result<Moved & { versionId: string; number: number }>> => {
    const row = reviewable(await lockTemplate(locked, input.id), input, facts.slug, stored.text);
    if (!row.ok) return row;
    const next = nextState(row.value, 'ask');
    if (!next.ok) return next;
    if (!(await checkedInOrder(locked, input.id, digest)))
      return refuse('not-checked', 'A check of exactly this text over 2,000 draws has to be in order first: check it, mend what it finds, then ask.');
    const version = await makeVersion(locked, row.value, whole.value);
    await locked.db.insertInto('template_review').values({ version_id: version.id, asked_by: asker, ask_note: input.note }).execute();
    await settle(locked, row.value, next.state);
    await record(locked, { kind: 'template.review-asked', subject: 'template', subjectId: input.id, data: { version: version.number, digest }, note: input.note || undefined });
    return done({ id: input.id, slug: row.value.slug, state: next.state, versionId: version.id, number: version.number });
  });
}

const waiting = (context: LockingContext) =>
  context.db
    .selectFrom('template_review')
    .innerJoin('template_version', 'template_version.id', 'template_review.version_id')
    .where('template_review.verdict', 'is', null)
    .select(['template_version.id', 'template_version.template_id', 'template_version.number', 'template_version.writers', 'template_review.asked_by']);

async function close(context: LockingContext, versionId: string, verdict: string, note: string): Promise<void> {
  await context.db
    .updateTable('template_review')
    .set({ verdict, note, decided_by: accountId(context.actor), decided_at: sql`app.now()` })
    .where('version_id', '=', versionId)
    .execute();
}

/** Whether tables, cautions and engine are still those that the version was checked with. */
async function stillStands(version: { text: string; digests: unknown } | undefined): Promise<Result<null>> {
  if (!version) return notFound();
  const whole = await readWhole(version.text);
  if (whole.ok && canonical(whole.value.digests) === canonical(version.digests)) return done(null);
  return refuse('changed-since', 'Tables, cautions or the engine changed since this version was checked: return it, so that it is checked again.');
}

/** Approves a version in review, or returns it with what has to change. Refused to everybody who wrote on it or asked. */
export async function decideReview(context: Context, input: DecisionInput): Promise<Result<Moved>> {
  if (!mayUseBank(context.actor)) return notFound();
  const found = await context.db.selectFrom('template_version').select(['template_id', 'text', 'digests']).where('id', '=', input.versionId).executeTakeFirst();
  const stands = input.verdict === 'approved' ? await stillStands(found) : done(null);
  return inTransaction(context, async (locked): Promise<Result<Moved>> => {
    const row = found && (await lockTemplate(locked, found.template_id));
    if (!row) return notFound();
    const version = await waiting(locked).where('template_version.id', '=', input.versionId).executeTakeFirst();
    if (!version) return refuse('decided', 'This review is over already: load the page again to see what was decided.');
    if (!mayDecide(locked.actor, { askedBy: version.asked_by, writers: version.writers }))
      return refuse('own-work', 'You wrote on this text or asked for its review, so a second instructor has to decide.');
    if (!stands.ok) return stands;
    const next = nextState(row, input.verdict === 'approved' ? 'approve' : 'return');
    if (!next.ok) return next;
    await close(locked, version.id, input.verdict, input.note);
    await record(locked, { kind: `template.${input.verdict}`, subject: 'template', subjectId: row.id, data: { version: version.number }, note: input.note || undefined });
    return settle(locked, row, next.state);
  });
}

/** Takes a template back from review, to write on: for the one who asked and those who wrote on it. */
export async function takeBack(context: Context, input: { id: string }): Promise<Result<Moved>> {
  const account = accountId(context.actor);
  if (!mayUseBank(context.actor) || !account) return notFound();
  return inTransaction(context, async (locked): Promise<Result<Moved>> => {
    const row = await lockTemplate(locked, input.id);
    if (!row) return notFound();
    const next = nextState(row, 'take-back');
    if (!next.ok) return next;
    const version = await waiting(locked).where('template_version.template_id', '=', row.id).executeTakeFirstOrThrow();
    if (!isAuthor(account, { askedBy: version.asked_by, writers: version.writers }))
      return refuse('not-yours', 'Only those who wrote the text or asked for the review can take it back. You can return it with a note.');
    await close(locked, version.id, 'taken back', '');
    await record(locked, { kind: 'template.taken-back', subject: 'template', subjectId: row.id, data: { version: version.number } });
    return settle(locked, row, next.state);
  });
}

/** Retires a template: no new exam can choose it; forms that stand on its versions keep them. */
export async function retire(context: Context, input: { id: string }): Promise<Result<Moved>> {
  if (!mayUseBank(context.actor)) return notFound();
  return inTransaction(context, async (locked): Promise<Result<Moved>> => {
    const row = await lockTemplate(locked, input.id);
    if (!row) return notFound();
    const next = nextState(row, 'retire');
    if (!next.ok) return next;
    const versions = locked.db.selectFrom('template_version').select('id').where('template_id', '=', row.id);
    await locked.db
      .updateTable('template_review')
      .set({ retired_at: sql`app.now()` })
      .where('version_id', 'in', versions)
      .where('verdict', '=', 'approved')
      .where('retired_at', 'is', null)
      .execute();
    await record(locked, { kind: 'template.retired', subject: 'template', subjectId: row.id });
    return settle(locked, row, next.state);
  });
}
