import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import { type Context, accountId, type Role } from '@/lib/context';
import { isId } from '@/lib/ids';
import { mayManagePeople } from '@/lib/people/policy';
import { done, notFound, type Result } from '@/lib/result';
import type { RawRoster, RosterPreview, RosterProblem, RosterRow, RosterTaken } from './model';
import { type KnownAccount, planRoster, type Surroundings } from './plan';

/** What the table keeps of a file that was read. */
export type StoredRoster = { encoding: RawRoster['encoding']; unknown: string[]; rows: RosterRow[]; termId: string; makeClasses: boolean; invite: boolean };

type RawNeed = { extraPercent: number; extraMinutes: number; restMinutes: number; largePrint: boolean; separateRoom: boolean; since: string; until: string };

async function knownAccounts(db: Kysely<DB>, rows: readonly RosterRow[], termId: string): Promise<KnownAccount[]> {
  const emails = rows.map((row) => row.email).filter(Boolean);
  const numbers = rows.map((row) => row.learnerNumber.toLowerCase()).filter(Boolean);
  const found = await db
    .selectFrom('account')
    .where((where) => where.or([where('email', '=', sql<string>`any(${emails})`), where(sql`lower(learner_number)`, '=', sql`any(${numbers})`)]))
    .select(['id', 'name', 'sort_name', 'email', 'learner_number', 'state'])
    .select([
      sql<Role[]>`array(select role from account_role where account_id = account.id)`.as('roles'),
      sql<string[]>`array(select enrolment.class_id::text from enrolment join class on class.id = enrolment.class_id
        where enrolment.account_id = account.id and enrolment.until is null and class.term_id = ${termId})`.as('enrolled'),
      sql<string[]>`array(select class_id::text from class_instructor where account_id = account.id)`.as('taught'),
      sql<RawNeed[]>`coalesce((select jsonb_agg(jsonb_build_object('extraPercent', extra_percent, 'extraMinutes', extra_minutes, 'restMinutes', rest_minutes,
        'largePrint', large_print, 'separateRoom', separate_room, 'since', since, 'until', coalesce(until::text, '')))
        from accommodation where account_id = account.id and ended_at is null), '[]')`.as('needs'),
    ])
    .execute();
  return found.map((row) => ({
    id: row.id,
    name: row.name,
    sortName: row.sort_name,
    email: row.email,
    learnerNumber: row.learner_number,
    state: row.state,
    roles: row.roles,
    enrolledIn: row.enrolled,
    teaches: row.taught,
    accommodations: row.needs.map((need) => ({ ...need, extraPercent: Number(need.extraPercent) })),
  }));
}

/** What the school has that rows touch; null when the term is not there. */
export async function readSurroundings(db: Kysely<DB>, rows: readonly RosterRow[], termId: string, makeClasses: boolean): Promise<Surroundings | null> {
  const term = await db.selectFrom('term').where('id', '=', termId).select(['id', 'name']).executeTakeFirst();
  if (!term) return null;
  const classes = await db.selectFrom('class').where('term_id', '=', termId).select(['id', 'name']).execute();
  return { accounts: await knownAccounts(db, rows, termId), classes, term, makeClasses };
}

/** What taking it in did, from the log: the rows themselves are gone. */
async function countsOf(context: Context, id: string): Promise<RosterTaken | null> {
  const row = await context.db.selectFrom('event').where('subject', '=', 'roster').where('subject_id', '=', id).where('kind', '=', 'roster.taken').select('data').executeTakeFirst();
  return row ? (row.data as unknown as RosterTaken) : null;
}

const emptyTerm = { id: '', name: '' };

/** A file that was read, as it would act on the school now. Only whoever read it, while a registrar, sees it. */
export async function readPreview(context: Context, id: string): Promise<Result<RosterPreview>> {
  if (!mayManagePeople(context.actor) || !isId(id)) return notFound();
  const row = await context.db.selectFrom('roster_import').where('id', '=', id).where('made_by', '=', accountId(context.actor)).selectAll().executeTakeFirst();
  if (!row) return notFound();
  const state = row.state as RosterPreview['state'];
  const shell = { id, fileName: row.file_name, state };
  if (state !== 'previewed') return done({ ...shell, taken: await countsOf(context, id), encoding: 'UTF-8', unknown: [], rows: [], problems: [], newClasses: [], term: emptyTerm, makeClasses: false, invite: false });
  const stored = row.rows as unknown as StoredRoster;
  const around = await readSurroundings(context.db, stored.rows, stored.termId, stored.makeClasses);
  if (!around) return notFound();
  const plan = planRoster(stored.rows, around);
  const problems = [...(row.problems as unknown as RosterProblem[]), ...plan.problems].sort((a, b) => a.line - b.line);
  const { encoding, unknown, makeClasses, invite } = stored;
  return done({ ...shell, taken: null, encoding, unknown, rows: plan.planned, problems, newClasses: plan.newClasses, term: around.term, makeClasses, invite });
}
