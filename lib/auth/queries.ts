import { sql } from 'kysely';
import type { Database } from '@/db/client';
import type { Actor, Role } from '@/lib/context';
import { isId } from '@/lib/ids';
import { signInHours } from './rules';
import { tokenDigest } from './tokens';
import type { LinkPurpose } from './model';

export type AccountActor = Extract<Actor, { kind: 'account' }>;

/** Who is signed in under this id; null when the sign-in ended, is too old, or the account's epoch moved on. */
export async function readActor(db: Database, signInId: string): Promise<AccountActor | null> {
  if (!isId(signInId)) return null;
  const row = await db
    .selectFrom('sign_in')
    .innerJoin('account', (join) => join.onRef('account.id', '=', 'sign_in.account_id').onRef('account.epoch', '=', 'sign_in.epoch'))
    .where('sign_in.id', '=', signInId)
    .where('sign_in.ended_at', 'is', null)
    .where('sign_in.began_at', '>', sql<Date>`app.now() - make_interval(hours => ${signInHours})`)
    .where('account.state', '=', 'active')
    .select(['account.id', 'account.name'])
    .select((select) =>
      select
        .selectFrom('account_role')
        .whereRef('account_role.account_id', '=', 'account.id')
        .select(sql<Role[]>`coalesce(array_agg(role), '{}')`.as('roles'))
        .as('roles'),
    )
    .executeTakeFirst();
  return row ? { kind: 'account', id: row.id, name: row.name, roles: new Set(row.roles) } : null;
}

export type OpenLink = { name: string; identifier: string };

/** Whose link this is, while it can be redeemed; null for any other token. Reading it uses nothing up. */
export async function readLink(db: Database, purpose: LinkPurpose, token: string): Promise<OpenLink | null> {
  const row = await db
    .selectFrom('account_link')
    .innerJoin('account', 'account.id', 'account_link.account_id')
    .where('token_hash', '=', tokenDigest(token))
    .where('purpose', '=', purpose)
    .where('used_at', 'is', null)
    .where('expires_at', '>', sql<Date>`app.now()`)
    .where('account.state', '<>', 'closed')
    .select(['account.name', 'account.email', 'account.learner_number'])
    .executeTakeFirst();
  return row ? { name: row.name, identifier: row.email ?? row.learner_number ?? '' } : null;
}

export type OwnAccount = { id: string; name: string; email: string | null; learnerNumber: string | null; hasPassword: boolean; signIns: OwnSignIn[] };
export type OwnSignIn = { id: string; beganAt: Date; device: string };

/** The signed-in person's own account, with the sign-ins that are still good. */
export async function readOwnAccount(db: Database, actor: AccountActor): Promise<OwnAccount> {
  const account = await db
    .selectFrom('account')
    .where('id', '=', actor.id)
    .select(['id', 'name', 'email', 'learner_number', 'epoch'])
    .select(sql<boolean>`password_hash is not null`.as('has_password'))
    .executeTakeFirstOrThrow();
  const signIns = await db
    .selectFrom('sign_in')
    .where('account_id', '=', actor.id)
    .where('ended_at', 'is', null)
    .where('epoch', '=', account.epoch)
    .where('began_at', '>', sql<Date>`app.now() - make_interval(hours => ${signInHours})`)
    .select(['id', 'began_at', 'device'])
    .orderBy('began_at', 'desc')
    .execute();
  return {
    id: account.id,
    name: account.name,
    email: account.email,
    learnerNumber: account.learner_number,
    hasPassword: account.has_password,
    signIns: signIns.map((row) => ({ id: row.id, beganAt: row.began_at, device: row.device })),
  };
}
