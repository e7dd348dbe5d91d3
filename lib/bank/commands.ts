import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { type FileOutcome, mostFiles, type NewTemplateInput, type SaveInput, slugOf, slugText, type TemplateFacts, type TemplateFile, type TemplateState, templateText } from './model';
import { mayUseBank } from './policy';
import { factsOf } from './reading';
import { nextState } from './rules';
import { starterText } from './starter';
import { lockTemplate, lockTemplateBySlug, type LockedTemplate, withWriter } from './store';

export type Saved = { id: string; slug: string; revision: number; state: TemplateState; savedAt: Date };

const columnsOf = (facts: TemplateFacts | null) =>
  facts ? { title: facts.title, area: facts.area, level: facts.level, minutes: facts.minutes, marks: facts.marks, kinds: facts.kinds, cautions: facts.cautions } : {};

/** A slug in the text takes effect while no version bears the old one and nobody else has it. */
async function slugFor(context: LockingContext, row: LockedTemplate, facts: TemplateFacts | null): Promise<string> {
  if (!facts || facts.slug === row.slug || row.versions > 0 || !slugText.safeParse(facts.slug).success) return row.slug;
  const taken = await context.db.selectFrom('template').select('id').where('slug', '=', facts.slug).executeTakeFirst();
  return taken ? row.slug : facts.slug;
}

async function storeText(context: LockingContext, row: LockedTemplate, text: string, facts: TemplateFacts | null): Promise<Result<Saved>> {
  const next = nextState(row, 'edit');
  if (!next.ok) return next;
  const writer = accountId(context.actor);
  if (!writer) return notFound();
  const slug = await slugFor(context, row, facts);
  const saved = await context.db
    .updateTable('template')
    .set({ text, revision: row.revision + 1, state: next.state, slug, changed_by: writer, changed_at: sql`app.now()`, writers: withWriter(row.writers, writer), ...columnsOf(facts) })
    .where('id', '=', row.id)
    .returning(['revision', 'changed_at'])
    .executeTakeFirstOrThrow();
  await record(context, { kind: 'template.saved', subject: 'template', subjectId: row.id, data: { revision: saved.revision, reads: facts !== null } });
  return done({ id: row.id, slug, revision: saved.revision, state: next.state, savedAt: saved.changed_at });
}

/**
 * Stores the working text exactly as typed, also when it does not parse. Refused with `changed-since` when another
 * save came first: the stored text stays, and the one typed is the caller's to keep.
 */
export async function saveDraft(context: Context, input: SaveInput): Promise<Result<Saved>> {
  if (!mayUseBank(context.actor)) return notFound();
  const facts = await factsOf(input.text);
  return inTransaction(context, async (locked): Promise<Result<Saved>> => {
    const row = await lockTemplate(locked, input.id);
    if (!row) return notFound();
    if (row.revision !== input.revision)
      return refuse('changed-since', 'Somebody else saved this template meanwhile. Your text is still here: compare it with theirs, then save over it or keep theirs.');
    if (row.text !== input.text) return storeText(locked, row, input.text, facts);
    const { changed_at } = await locked.db.selectFrom('template').select('changed_at').where('id', '=', row.id).executeTakeFirstOrThrow();
    return done({ id: row.id, slug: row.slug, revision: row.revision, state: row.state, savedAt: changed_at });
  });
}

async function insertTemplate(context: LockingContext, slug: string, text: string, facts: TemplateFacts | null, title: string): Promise<Result<{ id: string; slug: string }>> {
  const owner = accountId(context.actor);
  if (!owner) return notFound();
  const row = await context.db
    .insertInto('template')
    .values({ slug, text, title, owner_id: owner, changed_by: owner, writers: [owner], ...columnsOf(facts) })
    .onConflict((conflict) => conflict.column('slug').doNothing())
    .returning('id')
    .executeTakeFirst();
  if (!row) return refuse('slug-taken', `Another template is called ${slug} already: choose another slug.`, 'slug');
  await record(context, { kind: 'template.made', subject: 'template', subjectId: row.id, data: { slug } });
  return done({ id: row.id, slug });
}

/** Makes a draft from a short text that reads and draws, to be written on. Refused when the slug is taken. */
export async function newTemplate(context: Context, input: NewTemplateInput): Promise<Result<{ id: string; slug: string }>> {
  if (!mayUseBank(context.actor)) return notFound();
  const text = starterText(input);
  const facts = await factsOf(text);
  return inTransaction(context, (locked) => insertTemplate(locked, input.slug, text, facts, input.title));
}

function slugOfFile(file: TemplateFile, facts: TemplateFacts | null): string {
  const written = /^template:[ \t]*["']?([a-z0-9-]+)["']?[ \t]*(?:#.*)?$/m.exec(file.text)?.[1];
  return facts?.slug ?? written ?? slugOf(file.name.replace(/^.*[\\/]/, '').replace(/\.ya?ml$/i, ''));
}

async function bringIn(context: Context, file: TemplateFile): Promise<FileOutcome> {
  if (!/\.ya?ml$/i.test(file.name)) return { name: file.name, outcome: 'refused', says: 'This is no template file: its name does not end in .yaml.' };
  const text = templateText.safeParse(file.text.replace(/^\ufeff/, ''));
  if (!text.success) return { name: file.name, outcome: 'refused', says: text.error.issues[0]?.message ?? 'This file cannot be stored.' };
  const facts = await factsOf(text.data);
  const slug = slugText.safeParse(slugOfFile({ ...file, text: text.data }, facts));
  if (!slug.success) return { name: file.name, outcome: 'refused', says: 'The file names no template: begin it with a line such as "template: shunt-weakened-field".' };
  const reads = facts ? 'It reads.' : 'Its text does not read yet: open it to see why.';
  return inTransaction(context, async (locked): Promise<FileOutcome> => {
    const row = await lockTemplateBySlug(locked, slug.data);
    if (row?.text === text.data) return { name: file.name, outcome: 'same', slug: slug.data, says: 'The bank holds this text already.' };
    const stored = row ? await storeText(locked, row, text.data, facts) : await insertTemplate(locked, slug.data, text.data, facts, facts?.title ?? slug.data);
    if (!stored.ok) return { name: file.name, outcome: 'refused', slug: slug.data, says: stored.says };
    return { name: file.name, outcome: row ? 'changed' : 'new', slug: slug.data, says: row ? `A new draft of the template. ${reads}` : `A new template. ${reads}` };
  });
}

/**
 * Takes template files into the bank, each by itself: a slug that is new makes a template, a known one gets a new
 * draft, a text that is there already changes nothing. Answers what became of each file.
 */
export async function bringInFiles(context: Context, files: readonly TemplateFile[]): Promise<Result<FileOutcome[]>> {
  if (!mayUseBank(context.actor)) return notFound();
  if (files.length === 0) return refuse('no-files', 'Choose one or more template files (.yaml).');
  if (files.length > mostFiles) return refuse('too-many', `Bring in at most ${mostFiles} files at once.`);
  const outcomes: FileOutcome[] = [];
  for (const file of files) outcomes.push(await bringIn(context, file));
  return done(outcomes);
}
