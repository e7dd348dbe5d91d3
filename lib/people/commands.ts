import { sql } from 'kysely';
import type { Database } from '@/db/client';
import { record } from '@/lib/audit/commands';
import { raiseEpoch, voidLinks } from '@/lib/auth/commands';
import { makeLink, sendLink } from '@/lib/auth/links';
import { type Context, inTransaction, type LockingContext, type Role } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { type AccountState, normalParticulars, type Particulars, particularsSchema, type PersonInput, personSchema } from './model';
import { mayManagePeople } from './policy';
import { type AccountEvent, nextAccountState } from './rules';

type Taken = 'email-taken' | 'learner-number-taken' | 'invalid';

const invalid = (issue: { message: string; path: PropertyKey[] } | undefined) => refuse('invalid', issue?.message ?? 'This cannot be read.', issue?.path.map(String).join('.'));

/** Says whose e-mail or learner number it is already; null when both are free (`except`: the account itself). */
async function takenBy(context: LockingContext, person: { email: string | null; learner_number: string | null }, except: string | null) {
  // Two registrars adding the same person at once: the second waits here and then sees the first one's row.
  await sql`select pg_advisory_xact_lock(hashtext('fullfield accounts'))`.execute(context.db);
  const rows = await context.db
    .selectFrom('account')
    .where((where) =>
      where.or([where('email', '=', person.email), where(sql`lower(learner_number)`, '=', person.learner_number?.toLowerCase() ?? null)]),
    )
    .select(['id', 'name', 'email'])
    .execute();
  const other = rows.find((row) => row.id !== except);
  if (!other) return null;
  return other.email !== null && other.email === person.email
    ? refuse('email-taken', `${other.name} has this e-mail already. Give that person the role, or use another address.`, 'email')
    : refuse('learner-number-taken', `${other.name} has this learner number already.`, 'learnerNumber');
}

/** Stores a new account, within a transaction whose caller has checked actor and input. */
export async function insertAccount(context: LockingContext, input: PersonInput): Promise<Result<{ id: string }, Taken>> {
  const person = normalParticulars(input);
  const taken = await takenBy(context, person, null);
  if (taken) return taken;
  const { id } = await context.db.insertInto('account').values(person).returning('id').executeTakeFirstOrThrow();
  const held = [...new Set(input.roles)];
  await context.db.insertInto('account_role').values(held.map((role) => ({ account_id: id, role }))).execute();
  await record(context, { kind: 'account.invited', subject: 'account', subjectId: id, data: { roles: held } });
  return done({ id });
}

/**
 * Makes an account (state `invited`) and, where it has an address and `invite` is wanted, mails an invitation.
 * Refused: `not-found` (no registrar), `invalid`, `email-taken`, `learner-number-taken`.
 */
export async function inviteAccount(context: Context, input: PersonInput, invite = true): Promise<Result<{ id: string; sent: boolean }>> {
  if (!mayManagePeople(context.actor)) return notFound();
  const read = personSchema.safeParse(input);
  if (!read.success) return invalid(read.error.issues[0]);
  return inTransaction(context, async (locked) => {
    const made = await insertAccount(locked, read.data);
    if (!made.ok) return made;
    const sent = invite ? await sendLink(locked, made.value.id, 'invitation') : done({ sent: false });
    return sent.ok ? done({ id: made.value.id, sent: sent.value.sent }) : sent;
  });
}

/** The first account of an installation, made by its operator: no registrar is there to ask. Returns the address of its invitation. */
export async function createRegistrar(db: Database, input: { name: string; email: string }): Promise<Result<{ id: string; address: string; expiresAt: Date }>> {
  const read = personSchema.safeParse({ ...input, sortName: '', learnerNumber: '', roles: ['registrar'] });
  if (!read.success) return invalid(read.error.issues[0]);
  return inTransaction({ db, actor: { kind: 'system', name: 'operator' } }, async (locked) => {
    const made = await insertAccount(locked, read.data);
    if (!made.ok) return made;
    const link = await makeLink(locked, made.value.id, 'invitation');
    return done({ id: made.value.id, address: link.address, expiresAt: link.expiresAt });
  });
}

type Locked = { id: string; state: AccountState; has_password: boolean; email: string | null };

/** The account under its row lock. */
async function lockAccount(context: LockingContext, id: string): Promise<Locked | undefined> {
  const row = await context.db
    .selectFrom('account')
    .where('id', '=', id)
    .select(['id', 'state', 'email'])
    .select(sql<boolean>`password_hash is not null`.as('has_password'))
    .forUpdate()
    .executeTakeFirst();
  return row && { ...row, state: row.state as AccountState };
}

/** A registrar's change of one account, under its lock, policy first. */
async function onAccount<Value>(context: Context, id: string, work: (locked: LockingContext, account: Locked) => Promise<Result<Value>>): Promise<Result<Value>> {
  if (!mayManagePeople(context.actor)) return notFound();
  return inTransaction(context, async (locked) => {
    const account = isId(id) ? await lockAccount(locked, id) : undefined;
    return account ? work(locked, account) : notFound();
  });
}

/** Changes name, sort name, e-mail and learner number. A changed e-mail ends open links, which went to the old one. */
export function changePerson(context: Context, id: string, input: Particulars): Promise<Result<null>> {
  const read = particularsSchema.safeParse(input);
  if (!read.success) return Promise.resolve(invalid(read.error.issues[0]));
  const person = normalParticulars(read.data);
  return onAccount(context, id, async (locked, account) => {
    const taken = await takenBy(locked, person, id);
    if (taken) return taken;
    const before = await locked.db.selectFrom('account').where('id', '=', id).select(['name', 'sort_name', 'email', 'learner_number']).executeTakeFirstOrThrow();
    const changed = (Object.keys(person) as (keyof typeof person)[]).filter((key) => person[key] !== before[key]);
    if (changed.length === 0) return done(null);
    await locked.db.updateTable('account').set({ ...person, changed_at: sql`app.now()` }).where('id', '=', id).execute();
    if (account.email !== person.email) await voidLinks(locked, id);
    const note = changed.includes('name') ? `${before.name} → ${person.name}` : undefined;
    await record(locked, { kind: 'account.changed', subject: 'account', subjectId: id, data: { changed }, note });
    return done(null);
  });
}

/** Refuses what would leave the school without a registrar who can sign in. Locks all registrars, so that two cannot go at once. */
async function keepsARegistrar(context: LockingContext, withoutId: string): Promise<Result<null, 'last-registrar'>> {
  const rows = await context.db
    .selectFrom('account')
    .innerJoin('account_role', 'account_role.account_id', 'account.id')
    .where('role', '=', 'registrar')
    .where('state', '=', 'active')
    .select('account.id')
    .orderBy('account.id')
    .forUpdate()
    .execute();
  const goes = rows.some((row) => row.id === withoutId);
  if (!goes || rows.length > 1) return done(null);
  return refuse('last-registrar', 'This is the only registrar who can sign in. Make somebody else a registrar first, and let them sign in once.');
}

/** Sets what roles an account holds. Where they change, every sign-in of it ends at once, and so do slips not yet used. */
export function setRoles(context: Context, id: string, wanted: readonly Role[]): Promise<Result<null>> {
  const next = [...new Set(wanted)];
  if (next.length === 0) return Promise.resolve(refuse('invalid', 'Give at least one role; to end access, close the account.', 'roles'));
  return withRegistrarsLocked(context, id, async (locked) => {
    const rows = await locked.db.selectFrom('account_role').where('account_id', '=', id).select('role').execute();
    const held = rows.map((row) => row.role);
    if (held.length === next.length && next.every((role) => held.includes(role))) return done(null);
    if (held.includes('registrar') && !next.includes('registrar')) {
      const kept = await keepsARegistrar(locked, id);
      if (!kept.ok) return kept;
    }
    await locked.db.deleteFrom('account_role').where('account_id', '=', id).execute();
    await locked.db.insertInto('account_role').values(next.map((role) => ({ account_id: id, role }))).execute();
    await raiseEpoch(locked, id);
    await voidSlips(locked, id);
    await record(locked, { kind: 'account.roles-changed', subject: 'account', subjectId: id, data: { from: held.sort(), to: next.sort() } });
    return done(null);
  });
}

/** As `onAccount`; the registrars' rows are locked first and in order, so that two such changes cannot wait for each other. */
async function withRegistrarsLocked(context: Context, id: string, work: (locked: LockingContext, account: Locked) => Promise<Result<null>>): Promise<Result<null>> {
  if (!mayManagePeople(context.actor)) return notFound();
  return inTransaction(context, async (locked) => {
    await sql`select pg_advisory_xact_lock(hashtext('fullfield registrars'))`.execute(locked.db);
    return onAccount(locked, id, work);
  });
}

/** Lets every slip of the account that was not used expire now. */
export async function voidSlips(context: LockingContext, id: string): Promise<void> {
  await context.db.updateTable('slip').set({ expires_at: sql`app.now()` }).where('account_id', '=', id).where('used_at', 'is', null).execute();
}

async function step(context: LockingContext, account: Locked, event: AccountEvent, kind: string): Promise<Result<null>> {
  const next = nextAccountState(account.state, event, account.has_password);
  if (!next.ok) return next;
  await context.db.updateTable('account').set({ state: next.value, changed_at: sql`app.now()` }).where('id', '=', account.id).execute();
  await record(context, { kind, subject: 'account', subjectId: account.id });
  return done(null);
}

/** Closes an account: sign-ins, seat tokens, links and slips end at once; what it did stays on record. */
export function closeAccount(context: Context, id: string): Promise<Result<null>> {
  return withRegistrarsLocked(context, id, async (locked, account) => {
    const kept = await keepsARegistrar(locked, id);
    if (!kept.ok) return kept;
    const closed = await step(locked, account, 'close', 'account.closed');
    if (!closed.ok) return closed;
    await raiseEpoch(locked, id);
    await voidLinks(locked, id);
    await voidSlips(locked, id);
    await locked.db.updateTable('candidate').set({ epoch: sql`epoch + 1` }).where('account_id', '=', id).where('ended_at', 'is', null).execute();
    return done(null);
  });
}

/** Opens a closed account again, with the password and roles it had. */
export const reopenAccount = (context: Context, id: string): Promise<Result<null>> =>
  onAccount(context, id, (locked, account) => step(locked, account, 'reopen', 'account.reopened'));

/** Mails a fresh link: the invitation to an invited account, a reset link to an active one. Earlier links end. */
export function sendFreshLink(context: Context, id: string): Promise<Result<null>> {
  return onAccount(context, id, async (locked, account) => {
    if (account.state === 'closed') return refuse('not-in-this-state', 'This account is closed. Reopen it first.');
    if (account.email === null) return refuse('no-address', 'This person has no e-mail. Give one, or print a slip from the page of the class.');
    const purpose = account.state === 'invited' ? 'invitation' : 'reset';
    const sent = await sendLink(locked, id, purpose);
    if (!sent.ok) return sent;
    await record(locked, { kind: 'account.link-sent', subject: 'account', subjectId: id, data: { purpose } });
    return done(null);
  });
}
