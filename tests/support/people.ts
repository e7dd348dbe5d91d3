import type { Database } from '@/db/client';
import type { Context, Role } from '@/lib/context';
import { redeemLink } from '@/lib/auth/commands';
import { makeLink } from '@/lib/auth/links';
import type { AccountActor } from '@/lib/auth/queries';
import { createRegistrar, inviteAccount } from '@/lib/people/commands';

export const goodPassword = 'copper wire 42';
export type Person = { id: string; context: Context & { actor: AccountActor } };

const asActor = (db: Database, id: string, name: string, held: Role[]): Person => ({ id, context: { db, actor: { kind: 'account', id, name, roles: new Set(held) } } });

/** The first registrar, as the operator makes one; the invitation is redeemed. */
export async function firstRegistrar(db: Database): Promise<Person> {
  const made = await createRegistrar(db, { name: 'Rosa Whitford', email: 'rosa@school.test' });
  if (!made.ok) throw new Error(made.says);
  const token = made.value.address.split('/').at(-1) ?? '';
  const joined = await redeemLink(db, 'invitation', { token, password: goodPassword });
  if (!joined.ok) throw new Error(joined.says);
  return asActor(db, made.value.id, 'Rosa Whitford', ['registrar']);
}

let count = 0;

/** An active account with a password, made by `registrar` through the real commands. */
export async function newPerson(registrar: Person, held: Role[], particulars: { name?: string; email?: string; learnerNumber?: string } = {}): Promise<Person> {
  count++;
  const name = particulars.name ?? `Person ${count}`;
  const input = { name, sortName: '', email: `person${count}@school.test`, learnerNumber: `T-${1000 + count}`, ...particulars, roles: held };
  const made = await inviteAccount(registrar.context, input, false);
  if (!made.ok) throw new Error(made.says);
  const link = await registrar.context.db.transaction().execute((db) => makeLink({ ...registrar.context, db }, made.value.id, 'invitation'));
  const joined = await redeemLink(registrar.context.db, 'invitation', { token: link.token, password: goodPassword });
  if (!joined.ok) throw new Error(joined.says);
  return asActor(registrar.context.db, made.value.id, name, held);
}
