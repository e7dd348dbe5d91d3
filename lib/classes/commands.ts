import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { type Context, inTransaction, type LockingContext, type Role } from '@/lib/context';
import { isId } from '@/lib/ids';
import { tidy } from '@/lib/people/model';
import { mayManagePeople } from '@/lib/people/policy';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { today } from '@/lib/school/today';
import { type ClassInput, classSchema, type TermInput, termSchema } from './model';

type Issue = { message: string; path: PropertyKey[] };
const invalid = (issue: Issue | undefined) => refuse('invalid', issue?.message ?? 'This cannot be read.', issue?.path.map(String).join('.'));
const lockNames = (context: LockingContext) => sql`select pg_advisory_xact_lock(hashtext('fullfield terms'))`.execute(context.db);

/** Makes a term, or changes the one of `id`. Refused: `not-found`, `invalid`, `name-taken`. */
export async function saveTerm(context: Context, id: string | null, input: TermInput): Promise<Result<{ id: string }>> {
  if (!mayManagePeople(context.actor)) return notFound();
  const read = termSchema.safeParse(input);
  if (!read.success) return invalid(read.error.issues[0]);
  const values = { name: tidy(read.data.name), starts_on: read.data.startsOn, ends_on: read.data.endsOn };
  return inTransaction(context, async (locked) => {
    await lockNames(locked);
    const same = await locked.db.selectFrom('term').where(sql`lower(name)`, '=', values.name.toLowerCase()).select('id').executeTakeFirst();
    if (same && same.id !== id) return refuse('name-taken', `There is a term ${values.name} already.`, 'name');
    const row =
      id === null
        ? await locked.db.insertInto('term').values(values).returning('id').executeTakeFirst()
        : await locked.db.updateTable('term').set(values).where('id', '=', isId(id) ? id : null).returning('id').executeTakeFirst();
    if (!row) return notFound();
    await record(locked, { kind: id === null ? 'term.made' : 'term.changed', subject: 'term', subjectId: row.id });
    return done(row);
  });
}

/** Ends a term, or opens it again. Its classes then leave the lists of what goes on; nothing is lost. */
export async function setTermState(context: Context, id: string, state: 'open' | 'ended'): Promise<Result<null>> {
  if (!mayManagePeople(context.actor) || !isId(id)) return notFound();
  return inTransaction(context, async (locked) => {
    const row = await locked.db.updateTable('term').set({ state }).where('id', '=', id).returning('id').executeTakeFirst();
    if (!row) return notFound();
    await record(locked, { kind: state === 'ended' ? 'term.ended' : 'term.opened', subject: 'term', subjectId: id });
    return done(null);
  });
}

/** Refuses unless every id is an account that is not closed and holds `role`; returns them without doubles. */
async function withRole(context: LockingContext, ids: readonly string[], role: Role, field: string): Promise<Result<string[], 'wrong-role'>> {
  const wanted = [...new Set(ids)];
  if (wanted.length === 0) return done([]);
  const rows = await context.db
    .selectFrom('account')
    .innerJoin('account_role', (join) => join.onRef('account_role.account_id', '=', 'account.id').on('role', '=', role))
    .where('account.id', 'in', wanted)
    .where('state', '<>', 'closed')
    .select('account.id')
    .execute();
  if (rows.length === wanted.length) return done(wanted);
  return refuse('wrong-role', `Choose people who are ${role}s here and whose account is not closed.`, field);
}

/** Makes a class, or changes the one of `id`, with its instructors. Refused: `not-found`, `invalid`, `name-taken`, `wrong-role`. */
export async function saveClass(context: Context, id: string | null, input: ClassInput): Promise<Result<{ id: string }>> {
  if (!mayManagePeople(context.actor)) return notFound();
  const read = classSchema.safeParse(input);
  if (!read.success) return invalid(read.error.issues[0]);
  const values = { term_id: read.data.termId, name: tidy(read.data.name), title: tidy(read.data.title) };
  return inTransaction(context, async (locked) => {
    await lockNames(locked);
    const term = await locked.db.selectFrom('term').where('id', '=', values.term_id).select('name').executeTakeFirst();
    if (!term) return refuse('invalid', 'Choose a term.', 'termId');
    const same = await locked.db
      .selectFrom('class')
      .where('term_id', '=', values.term_id)
      .where(sql`lower(name)`, '=', values.name.toLowerCase())
      .select('id')
      .executeTakeFirst();
    if (same && same.id !== id) return refuse('name-taken', `${term.name} has a class ${values.name} already.`, 'name');
    const instructors = await withRole(locked, read.data.instructorIds, 'instructor', 'instructorIds');
    if (!instructors.ok) return instructors;
    const row =
      id === null
        ? await locked.db.insertInto('class').values(values).returning('id').executeTakeFirst()
        : await locked.db.updateTable('class').set(values).where('id', '=', isId(id) ? id : null).returning('id').executeTakeFirst();
    if (!row) return notFound();
    await locked.db.deleteFrom('class_instructor').where('class_id', '=', row.id).execute();
    if (instructors.value.length > 0)
      await locked.db.insertInto('class_instructor').values(instructors.value.map((account_id) => ({ class_id: row.id, account_id }))).execute();
    await record(locked, { kind: id === null ? 'class.made' : 'class.changed', subject: 'class', subjectId: row.id, data: { instructors: instructors.value } });
    return done(row);
  });
}

/** Enrols students in a class; who left it before comes back. Refused: `not-found`, `wrong-role` (no student, or closed). */
export async function enrol(context: Context, classId: string, accountIds: readonly string[]): Promise<Result<{ enrolled: number }>> {
  if (!mayManagePeople(context.actor) || ![classId, ...accountIds].every(isId)) return notFound();
  return inTransaction(context, async (locked) => {
    const found = await locked.db.selectFrom('class').where('id', '=', classId).select('id').executeTakeFirst();
    if (!found) return notFound();
    const students = await withRole(locked, accountIds, 'student', 'accountIds');
    if (!students.ok) return students;
    const since = await today(locked.db);
    if (students.value.length === 0) return refuse('invalid', 'Choose at least one student.', 'accountIds');
    const rows = await locked.db
      .insertInto('enrolment')
      .values(students.value.map((account_id) => ({ class_id: classId, account_id, since })))
      .onConflict((conflict) => conflict.columns(['class_id', 'account_id']).doUpdateSet({ since, until: null }).where('enrolment.until', 'is not', null))
      .returning('account_id')
      .execute();
    for (const row of rows) await record(locked, { kind: 'enrolment.began', subject: 'account', subjectId: row.account_id, data: { class: classId } });
    return done({ enrolled: rows.length });
  });
}

/** Ends enrolments: from today on these students are not in the class. Sittings planned before keep the candidates until somebody takes them off. */
export async function endEnrolments(context: Context, classId: string, accountIds: readonly string[]): Promise<Result<{ ended: number }>> {
  if (!mayManagePeople(context.actor) || ![classId, ...accountIds].every(isId) || accountIds.length === 0) return notFound();
  return inTransaction(context, async (locked) => {
    const day = await today(locked.db);
    const rows = await locked.db
      .updateTable('enrolment')
      // The day before: one enrolled today leaves no day at all.
      .set({ until: sql`${day}::date - 1` })
      .where('class_id', '=', classId)
      .where('account_id', 'in', [...accountIds])
      .where((where) => where.or([where('until', 'is', null), where('until', '>=', day)]))
      .returning('account_id')
      .execute();
    if (rows.length === 0) return notFound();
    for (const row of rows) await record(locked, { kind: 'enrolment.ended', subject: 'account', subjectId: row.account_id, data: { class: classId } });
    return done({ ended: rows.length });
  });
}
