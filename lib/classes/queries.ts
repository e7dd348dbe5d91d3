import { sql } from 'kysely';
import { type Context, holds } from '@/lib/context';
import { isId } from '@/lib/ids';
import type { AccountState } from '@/lib/people/model';
import { mayManagePeople } from '@/lib/people/policy';
import { done, notFound, type Result } from '@/lib/result';
import { today } from '@/lib/school/today';
import type { ClassRow, TermRow, TermState } from './model';

const students = (day: string) => sql<number>`(select count(*)::int from enrolment where enrolment.class_id = class.id
  and (enrolment.until is null or enrolment.until >= ${day}::date))`;

/** All terms, the newest first. A registrar's. */
export async function listTerms(context: Context): Promise<Result<TermRow[]>> {
  if (!mayManagePeople(context.actor)) return notFound();
  const rows = await context.db
    .selectFrom('term')
    .select(['id', 'name', 'starts_on', 'ends_on', 'state'])
    .select([
      sql<number>`(select count(*)::int from class where class.term_id = term.id)`.as('classes'),
      sql<number>`(select count(distinct enrolment.account_id)::int from enrolment join class on class.id = enrolment.class_id where class.term_id = term.id)`.as('students'),
    ])
    .orderBy('starts_on', 'desc')
    .orderBy('name')
    .execute();
  return done(rows.map((row) => ({ id: row.id, name: row.name, startsOn: row.starts_on, endsOn: row.ends_on, state: row.state as TermState, classes: row.classes, students: row.students })));
}

const classes = (context: Context, day: string) =>
  context.db
    .selectFrom('class')
    .innerJoin('term', 'term.id', 'class.term_id')
    .select(['class.id', 'class.name', 'class.title', 'term.id as term_id', 'term.name as term', 'term.state as term_state', students(day).as('students')])
    .select(sql<string[]>`array(select account.name from class_instructor join account on account.id = class_instructor.account_id
      where class_instructor.class_id = class.id order by account.sort_name)`.as('instructors'));

type Raw = Awaited<ReturnType<ReturnType<typeof classes>['execute']>>[number];
const toRow = (row: Raw): ClassRow => ({
  id: row.id,
  name: row.name,
  title: row.title,
  termId: row.term_id,
  term: row.term,
  termState: row.term_state as TermState,
  instructors: row.instructors,
  students: row.students,
});

/** All classes, those of the newest term first. A registrar's. */
export async function listClasses(context: Context): Promise<Result<ClassRow[]>> {
  if (!mayManagePeople(context.actor)) return notFound();
  const rows = await classes(context, await today(context.db)).orderBy('term.starts_on', 'desc').orderBy('class.name').execute();
  return done(rows.map(toRow));
}

export type Member = { accountId: string; name: string; sortName: string; email: string | null; learnerNumber: string | null; state: AccountState; since: string; until: string | null };
export type Choice = { id: string; name: string; detail: string };
export type ClassPage = { row: ClassRow; instructorIds: string[]; members: Member[]; others: Choice[] };

/** A class with everybody ever enrolled and the students who could be. A registrar's. */
export async function readClass(context: Context, id: string): Promise<Result<ClassPage>> {
  if (!mayManagePeople(context.actor) || !isId(id)) return notFound();
  const row = await classes(context, await today(context.db)).where('class.id', '=', id).executeTakeFirst();
  if (!row) return notFound();
  const members = await context.db
    .selectFrom('enrolment')
    .innerJoin('account', 'account.id', 'enrolment.account_id')
    .where('class_id', '=', id)
    .select(['account.id as accountId', 'name', 'sort_name as sortName', 'email', 'learner_number as learnerNumber', 'state', 'since', 'until'])
    .orderBy('sort_name')
    .execute();
  const taught = await context.db.selectFrom('class_instructor').where('class_id', '=', id).select('account_id').execute();
  const here = new Set(members.filter((member) => member.until === null).map((member) => member.accountId));
  const others = (await peopleWith(context, 'student')).filter((student) => !here.has(student.id));
  const known = members.map((member) => ({ ...member, state: member.state as AccountState }));
  return done({ row: toRow(row), instructorIds: taught.map((one) => one.account_id), members: known, others });
}

async function peopleWith(context: Context, role: 'student' | 'instructor'): Promise<Choice[]> {
  const rows = await context.db
    .selectFrom('account')
    .innerJoin('account_role', 'account_role.account_id', 'account.id')
    .where('role', '=', role)
    .where('state', '<>', 'closed')
    .select(['account.id', 'sort_name as name', 'learner_number', 'email'])
    .orderBy('sort_name')
    .execute();
  return rows.map((row) => ({ id: row.id, name: row.name, detail: row.learner_number ?? row.email ?? '' }));
}

/** Who could teach a class. A registrar's. */
export async function listInstructors(context: Context): Promise<Result<Choice[]>> {
  return mayManagePeople(context.actor) ? done(await peopleWith(context, 'instructor')) : notFound();
}

/** The classes of open terms that the actor teaches; all of them for a registrar. */
export async function listOwnClasses(context: Context): Promise<Result<ClassRow[]>> {
  const { actor } = context;
  if (actor.kind !== 'account' || !holds(actor, 'instructor', 'registrar')) return notFound();
  let query = classes(context, await today(context.db)).where('term.state', '=', 'open');
  if (!holds(actor, 'registrar'))
    query = query.where((where) => where.exists(where.selectFrom('class_instructor').whereRef('class_instructor.class_id', '=', 'class.id').where('account_id', '=', actor.id).select('account_id')));
  return done((await query.orderBy('class.name').execute()).map(toRow));
}

/** Name of the open term that a day falls into, for the way in; null between terms. Everybody may know it. */
export async function readTermOn(db: Context['db'], day: string): Promise<string | null> {
  const row = await db
    .selectFrom('term')
    .where('state', '=', 'open')
    .where('starts_on', '<=', day)
    .where('ends_on', '>=', day)
    .select('name')
    .orderBy('starts_on', 'desc')
    .limit(1)
    .executeTakeFirst();
  return row?.name ?? null;
}
