import { sql } from 'kysely';
import type { Database } from '@/db/client';
import { record } from '@/lib/audit/commands';
import { type Context, inTransaction, type LockingContext } from '@/lib/context';
import { postChangeIn } from '@/lib/live/post';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { beginTry, forgive, triesAt } from './delays';
import { type ChangePasswordInput, deadLink, type LinkPurpose, type RedeemInput, type SignInInput, type SlipInput, slowed, wrongSignIn, wrongSlip } from './model';
import { hashPassword, passwordMatches } from './passwords';
import type { AccountActor } from './queries';
import { slipDigest, tokenDigest } from './tokens';

/** Where a try comes from: network address, and the browser in words. */
export type Origin = { address: string; device: string };
type Tries = ReturnType<typeof triesAt>;

const patienceSeconds = 2;
const patienceTries = 4;

/** Waits out short delays on the server, so that a room behind one address gets in slowly instead of being sent away. */
async function waitTurn(db: Database, tries: Tries): Promise<Result<null, 'slowed'>> {
  for (let turn = 1; ; turn++) {
    const wait = await beginTry(db, tries);
    if (wait === 0) return done(null);
    if (wait > patienceSeconds || turn === patienceTries) return refuse('slowed', slowed(Math.ceil(wait)));
    await new Promise((resolve) => setTimeout(resolve, wait * 1000));
  }
}

/** A new sign-in id each time; earlier ones stay good until they end. */
async function insertSignIn(db: Database, account: { id: string; epoch: number }, device: string): Promise<string> {
  const row = await db
    .insertInto('sign_in')
    .values({ account_id: account.id, epoch: account.epoch, device: device.slice(0, 120) })
    .returning('id')
    .executeTakeFirstOrThrow();
  return row.id;
}

const byIdentifier = (db: Database, typed: string) =>
  db
    .selectFrom('account')
    .where((where) => where.or([where('email', '=', typed.toLowerCase()), where(sql`lower(learner_number)`, '=', typed.toLowerCase())]))
    .select(['id', 'epoch', 'state', 'password_hash'])
    // An address of one person could be the learner number of nobody else: numbers hold no @ (lib/people/model.ts).
    .limit(1);

/**
 * Begins a sign-in by e-mail or learner number and password. Refused with the same words, after the same work, whether the account is
 * unknown, closed or the password wrong (`wrong`); or after many failures with the seconds to wait (`slowed`).
 */
export async function signInWithPassword(db: Database, input: SignInInput, origin: Origin): Promise<Result<{ signInId: string }, 'wrong' | 'slowed'>> {
  const account = await byIdentifier(db, input.identifier).executeTakeFirst();
  const tries = triesAt('sign-in', account?.id ?? input.identifier.toLowerCase(), origin.address);
  const turn = await waitTurn(db, tries);
  if (!turn.ok) return turn;
  const usable = account?.state === 'active' ? account : undefined;
  if (!(await passwordMatches(usable?.password_hash ?? null, input.password)) || !usable) return refuse('wrong', wrongSignIn);
  await forgive(db, tries);
  return done({ signInId: await insertSignIn(db, usable, origin.device) });
}

/** Begins a sign-in by learner number and the one-time code of a printed slip; the code is used up. The account becomes active. */
export async function signInWithSlip(db: Database, input: SlipInput, origin: Origin): Promise<Result<{ signInId: string }, 'wrong' | 'slowed'>> {
  const account = await byIdentifier(db, input.learnerNumber).executeTakeFirst();
  const tries = triesAt('slip', account?.id ?? input.learnerNumber.toLowerCase(), origin.address);
  const turn = await waitTurn(db, tries);
  if (!turn.ok) return turn;
  const signInId = await inTransaction({ db, actor: { kind: 'system', name: 'sign-in' } }, async (locked) => {
    const used = await locked.db
      .updateTable('slip')
      .set({ used_at: sql`app.now()` })
      .where('code_hash', '=', slipDigest(account?.id ?? '', input.code))
      .where('used_at', 'is', null)
      .where('expires_at', '>', sql<Date>`app.now()`)
      .returning(['id', 'account_id'])
      .executeTakeFirst();
    if (!used) return null;
    const row = await locked.db.selectFrom('account').where('id', '=', used.account_id).select(['id', 'epoch', 'state']).forUpdate().executeTakeFirstOrThrow();
    if (row.state === 'closed') return null;
    if (row.state === 'invited') await locked.db.updateTable('account').set({ state: 'active', changed_at: sql`app.now()` }).where('id', '=', row.id).execute();
    await record(locked, { kind: 'slip.used', subject: 'account', subjectId: row.id, data: { slip: used.id } });
    return insertSignIn(locked.db, row, origin.device);
  });
  if (signInId === null) return refuse('wrong', wrongSlip);
  await forgive(db, tries);
  return done({ signInId });
}

/** Ends one sign-in: the browser's own. */
export async function endSignIn(db: Database, signInId: string): Promise<void> {
  await db.updateTable('sign_in').set({ ended_at: sql`app.now()` }).where('id', '=', signInId).where('ended_at', 'is', null).execute();
}

/** Lets every open stream of a sitting look anew who it belongs to. */
async function wakeStreams(context: LockingContext): Promise<void> {
  const live = await context.db.selectFrom('sitting').where('state', 'in', ['check-in', 'running', 'paused']).select('id').execute();
  for (const sitting of live) await postChangeIn(context.db, sitting.id);
}

/** Raises the account's epoch: every sign-in until now ends at once. */
export async function raiseEpoch(context: LockingContext, accountId: string): Promise<number> {
  const row = await context.db
    .updateTable('account')
    .set({ epoch: sql`epoch + 1`, changed_at: sql`app.now()` })
    .where('id', '=', accountId)
    .returning('epoch')
    .executeTakeFirstOrThrow();
  await context.db.updateTable('sign_in').set({ ended_at: sql`app.now()` }).where('account_id', '=', accountId).where('ended_at', 'is', null).execute();
  await wakeStreams(context);
  return row.epoch;
}

/** Signs the actor out on every device, this one too. */
export async function endAllSignIns(context: Context & { actor: AccountActor }): Promise<Result<null>> {
  return inTransaction(context, async (locked) => {
    await raiseEpoch(locked, context.actor.id);
    await record(locked, { kind: 'account.signed-out-everywhere', subject: 'account', subjectId: context.actor.id });
    return done(null);
  });
}

/**
 * Changes the actor's own password and ends every sign-in, `signInId` (the browser's own) excepted: it goes on under the new epoch.
 * Someone who came in by a slip and has no password yet gives none.
 */
export async function changePassword(
  context: Context & { actor: AccountActor },
  signInId: string,
  input: ChangePasswordInput,
  origin: Origin,
): Promise<Result<null, 'wrong' | 'slowed' | 'not-found'>> {
  const account = await context.db.selectFrom('account').where('id', '=', context.actor.id).select('password_hash').executeTakeFirst();
  if (!account) return notFound();
  if (account.password_hash !== null) {
    const tries = triesAt('sign-in', context.actor.id, origin.address);
    const turn = await waitTurn(context.db, tries);
    if (!turn.ok) return turn;
    if (!(await passwordMatches(account.password_hash, input.current))) return refuse('wrong', 'That is not your present password.', 'current');
    await forgive(context.db, tries);
  }
  const password_hash = await hashPassword(input.password);
  return inTransaction(context, async (locked) => {
    const epoch = await raiseEpoch(locked, context.actor.id);
    await locked.db.updateTable('account').set({ password_hash }).where('id', '=', context.actor.id).execute();
    await locked.db.updateTable('sign_in').set({ epoch, ended_at: null }).where('id', '=', signInId).where('account_id', '=', context.actor.id).execute();
    await voidLinks(locked, context.actor.id);
    await record(locked, { kind: 'account.password-changed', subject: 'account', subjectId: context.actor.id });
    return done(null);
  });
}

/** Lets every link of the account that was not redeemed expire now. */
export async function voidLinks(context: LockingContext, accountId: string): Promise<void> {
  await context.db
    .updateTable('account_link')
    .set({ expires_at: sql`app.now()` })
    .where('account_id', '=', accountId)
    .where('used_at', 'is', null)
    .where('expires_at', '>', sql<Date>`app.now()`)
    .execute();
}

/**
 * Redeems an invitation or reset: sets the password, makes an invited account active and ends all earlier sign-ins.
 * A link works once, also when redeemed twice at the same moment.
 */
export async function redeemLink(db: Database, purpose: LinkPurpose, input: RedeemInput): Promise<Result<{ accountId: string }, 'dead-link'>> {
  const password_hash = await hashPassword(input.password);
  return inTransaction({ db, actor: { kind: 'system', name: `${purpose} link` } }, async (locked) => {
    const link = await locked.db
      .updateTable('account_link')
      .set({ used_at: sql`app.now()` })
      .where('token_hash', '=', tokenDigest(input.token))
      .where('purpose', '=', purpose)
      .where('used_at', 'is', null)
      .where('expires_at', '>', sql<Date>`app.now()`)
      .returning('account_id')
      .executeTakeFirst();
    if (!link) return refuse('dead-link', deadLink);
    const account = await locked.db.selectFrom('account').where('id', '=', link.account_id).select(['id', 'state']).forUpdate().executeTakeFirstOrThrow();
    if (account.state === 'closed') return refuse('dead-link', deadLink);
    await raiseEpoch(locked, account.id);
    await locked.db.updateTable('account').set({ password_hash, state: 'active' }).where('id', '=', account.id).execute();
    await voidLinks(locked, account.id);
    await record(locked, { kind: purpose === 'invitation' ? 'account.joined' : 'account.password-reset', subject: 'account', subjectId: account.id });
    return done({ accountId: account.id });
  });
}
