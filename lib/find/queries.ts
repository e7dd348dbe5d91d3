import { sql } from 'kysely';
import { type Context, holds } from '@/lib/context';
import { maySeeSitting } from '@/lib/sittings/relation';

export type Hit = { href: string; title: string; kind: string };

const most = 6;
/** A pattern for ILIKE that finds the text as it is. */
const containing = (text: string): string => `%${text.replace(/[\\%_]/g, '\\$&')}%`;

async function people(context: Context, like: string): Promise<Hit[]> {
  if (!holds(context.actor, 'registrar')) return [];
  const accounts = await context.db
    .selectFrom('account')
    .where((where) => where.or([where('name', 'ilike', like), where('sort_name', 'ilike', like), where('email', 'ilike', like), where('learner_number', 'ilike', like)]))
    .select(['id', 'name'])
    .orderBy('sort_name')
    .limit(most)
    .execute();
  const classes = await context.db
    .selectFrom('class')
    .innerJoin('term', 'term.id', 'class.term_id')
    .where((where) => where.or([where('class.name', 'ilike', like), where('class.title', 'ilike', like)]))
    .select(['class.id', sql<string>`class.name || ', ' || term.name`.as('title')])
    .orderBy('term.starts_on', 'desc')
    .limit(most)
    .execute();
  return [
    ...accounts.map((row) => ({ href: `/people/${row.id}`, title: row.name, kind: 'person' })),
    ...classes.map((row) => ({ href: `/people/classes/${row.id}`, title: row.title, kind: 'class' })),
  ];
}

async function questions(context: Context, like: string): Promise<Hit[]> {
  if (!holds(context.actor, 'instructor')) return [];
  const templates = await context.db
    .selectFrom('template')
    .where((where) => where.or([where('title', 'ilike', like), where('slug', 'ilike', like)]))
    .select(['slug', 'title'])
    .orderBy('title')
    .limit(most)
    .execute();
  const exams = await context.db.selectFrom('exam').where('title', 'ilike', like).select(['id', 'title']).orderBy('title').limit(most).execute();
  return [
    ...templates.map((row) => ({ href: `/bank/${row.slug}`, title: row.title, kind: 'template' })),
    ...exams.map((row) => ({ href: `/exams/${row.id}`, title: row.title, kind: 'exam' })),
  ];
}

async function sittings(context: Context, like: string): Promise<Hit[]> {
  if (!holds(context.actor, 'instructor', 'proctor', 'registrar')) return [];
  const rows = await context.db
    .selectFrom('sitting')
    .where((where) => where.or([where('title', 'ilike', like), where('room', 'ilike', like)]))
    .where(maySeeSitting(context.actor))
    .select(['id', 'title'])
    .orderBy('starts_at', 'desc')
    .limit(most)
    .execute();
  return rows.map((row) => ({ href: `/sittings/${row.id}`, title: row.title, kind: 'sitting' }));
}

/** What the actor may see whose name holds `text` (two letters or more): people, classes, templates, exams, sittings; a few of each. */
export async function find(context: Context, text: string): Promise<Hit[]> {
  const wanted = text.trim().slice(0, 100);
  if (wanted.length < 2) return [];
  const like = containing(wanted);
  const found = await Promise.all([people(context, like), questions(context, like), sittings(context, like)]);
  return found.flat();
}
