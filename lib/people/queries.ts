import { sql } from 'kysely';
import type { Context, Role } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { today } from '@/lib/school/today';
import type { AccountState } from './model';
import { mayManagePeople } from './policy';

export type PersonRow = {
  id: string;
  name: string;
  sortName: string;
  email: string | null;
  learnerNumber: string | null;
  state: AccountState;
  roles: Role[];
  /** Names of the classes enrolled in or taught, of terms that are open. */
  classes: string[];
  lastSignIn: Date | null;
};

const people = (context: Context, day: string) =>
  context.db
    .selectFrom('account')
    .select(['account.id', 'account.name', 'sort_name', 'email', 'learner_number', 'state'])
    .select((select) => [
      select.selectFrom('account_role').whereRef('account_role.account_id', '=', 'account.id').select(sql<Role[]>`coalesce(array_agg(role order by role), '{}')`.as('roles')).as('roles'),
      select.selectFrom('sign_in').whereRef('sign_in.account_id', '=', 'account.id').select(sql<Date | null>`max(began_at)`.as('last')).as('last_sign_in'),
      sql<string[]>`array(select class.name from class join term on term.id = class.term_id and term.state = 'open'
        where exists (select from enrolment where enrolment.class_id = class.id and enrolment.account_id = account.id
            and (enrolment.until is null or enrolment.until >= ${day}::date))
          or exists (select from class_instructor where class_instructor.class_id = class.id and class_instructor.account_id = account.id)
        order by class.name)`.as('classes'),
    ]);

type Raw = Awaited<ReturnType<ReturnType<typeof people>['execute']>>[number];
const toRow = (row: Raw): PersonRow => ({
  id: row.id,
  name: row.name,
  sortName: row.sort_name,
  email: row.email,
  learnerNumber: row.learner_number,
  state: row.state as AccountState,
  roles: row.roles ?? [],
  classes: row.classes,
  lastSignIn: row.last_sign_in,
});

/** Everybody with an account, by sort name. A registrar's. */
export async function listPeople(context: Context): Promise<Result<PersonRow[]>> {
  if (!mayManagePeople(context.actor)) return notFound();
  const rows = await people(context, await today(context.db)).orderBy('sort_name').orderBy('account.id').execute();
  return done(rows.map(toRow));
}

export type PersonEvent = { id: number; at: Date; kind: string; actor: string | null; note: string | null };
export type PersonClass = { id: string; name: string; term: string; part: 'enrolled' | 'teaches'; since: string | null; until: string | null };
export type OpenLinkRow = { purpose: 'invitation' | 'reset'; madeAt: Date; expiresAt: Date };
export type PersonPage = { person: PersonRow; classes: PersonClass[]; openLink: OpenLinkRow | null; events: PersonEvent[] };

async function classesOf(context: Context, id: string): Promise<PersonClass[]> {
  const enrolled = context.db
    .selectFrom('enrolment')
    .innerJoin('class', 'class.id', 'enrolment.class_id')
    .innerJoin('term', 'term.id', 'class.term_id')
    .where('enrolment.account_id', '=', id)
    .select(['class.id', 'class.name', 'term.name as term', 'term.starts_on', 'since', 'until', sql<'enrolled' | 'teaches'>`'enrolled'`.as('part')]);
  const taught = context.db
    .selectFrom('class_instructor')
    .innerJoin('class', 'class.id', 'class_instructor.class_id')
    .innerJoin('term', 'term.id', 'class.term_id')
    .where('class_instructor.account_id', '=', id)
    .select(['class.id', 'class.name', 'term.name as term', 'term.starts_on', sql<string>`null::date`.as('since'), sql<string | null>`null::date`.as('until')])
    .select(sql<'enrolled' | 'teaches'>`'teaches'`.as('part'));
  const rows = await enrolled.unionAll(taught).orderBy('starts_on', 'desc').orderBy('name').execute();
  return rows.map((row) => ({ id: row.id, name: row.name, term: row.term, part: row.part, since: row.since, until: row.until }));
}

async function eventsOf(context: Context, id: string): Promise<PersonEvent[]> {
  const rows = await context.db
    .selectFrom('event')
    .leftJoin('account as actor', 'actor.id', 'event.actor_id')
    .leftJoin('event_note', 'event_note.event_id', 'event.id')
    .where('subject', '=', 'account')
    .where('subject_id', '=', id)
    .select(['event.id', 'event.at', 'event.kind', 'actor.name as actor', 'event_note.note'])
    .orderBy('event.id', 'desc')
    .limit(100)
    .execute();
  return rows;
}

/** One person with classes, the link that is still open and what was done to the account. A registrar's. */
export async function readPerson(context: Context, id: string): Promise<Result<PersonPage>> {
  if (!mayManagePeople(context.actor) || !isId(id)) return notFound();
  const row = await people(context, await today(context.db)).where('account.id', '=', id).executeTakeFirst();
  if (!row) return notFound();
  const link = await context.db
    .selectFrom('account_link')
    .where('account_id', '=', id)
    .where('used_at', 'is', null)
    .where('expires_at', '>', sql<Date>`app.now()`)
    .select(['purpose', 'made_at', 'expires_at'])
    .orderBy('made_at', 'desc')
    .executeTakeFirst();
  const openLink = link ? { purpose: link.purpose as 'invitation' | 'reset', madeAt: link.made_at, expiresAt: link.expires_at } : null;
  return done({ person: toRow(row), classes: await classesOf(context, id), openLink, events: await eventsOf(context, id) });
}
