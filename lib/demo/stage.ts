import { sql } from 'kysely';
import type { Database } from '@/db/client';
import { makeLink } from '@/lib/auth/links';
import { redeemLink } from '@/lib/auth/commands';
import { type Context, inTransaction, type Role } from '@/lib/context';
import type { Result } from '@/lib/result';

/** What the acts of the demo share: the database, a way to say what goes on, and a clock that can be set. */
export type Stage = { db: Database; say: (line: string) => void };
export type Player = Context & { id: string };

/** Takes the value of a command that has to succeed here; a refusal is a mistake of the demo and stops it. */
export function must<Value>(result: Result<Value>, what: string): Value {
  if (!result.ok) throw new Error(`Demo: ${what} was refused (${result.code}): ${result.says}`);
  return result.value;
}

/** Sets `app.now()` to so many minutes before (or after) the true time; the true time stands beside it in the log. */
export const setMinutes = (db: Database, minutes: number): Promise<unknown> =>
  sql`update app.installation set clock_shift = make_interval(mins => ${minutes})`.execute(db);

export const asAccount = (db: Database, id: string, name: string, roles: readonly Role[]): Player => ({
  id, db, actor: { kind: 'account', id, name, roles: new Set(roles) },
});

/** Gives an account its password the way people get it: by redeeming an invitation. */
export async function giveCredential(db: Database, accountId: string, password: string): Promise<void> {
  const link = await inTransaction({ db, actor: { kind: 'system', name: 'demo' } }, (locked) => makeLink(locked, accountId, 'invitation'));
  must(await redeemLink(db, 'invitation', { token: link.token, password }), 'redeeming an invitation');
}
