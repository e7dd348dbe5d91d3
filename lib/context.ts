import type { Kysely, Transaction } from 'kysely';
import type { DB } from '@/db/types';

export const roles = ['instructor', 'student', 'proctor', 'registrar'] as const;
export type Role = (typeof roles)[number];

/** Who acts. `system` is a job or a command of the operator: it passes no policy by itself, commands say where it may act. */
export type Actor = { kind: 'account'; id: string; name: string; roles: ReadonlySet<Role> } | { kind: 'system'; name: string };

/** First argument of every query and command. `db` may be a pool or an open transaction; time is `app.now()` of that database. */
export type Context = { db: Kysely<DB>; actor: Actor };
/** Functions that lock rows demand this one, so that the type proves it. */
export type LockingContext = { db: Transaction<DB>; actor: Actor };

export const holds = (actor: Actor, ...wanted: Role[]): boolean => actor.kind === 'account' && wanted.some((role) => actor.roles.has(role));
export const accountId = (actor: Actor): string | null => (actor.kind === 'account' ? actor.id : null);

/** Runs `work` in one transaction, or in the one that is open already. */
export async function inTransaction<Value>(context: Context, work: (context: LockingContext) => Promise<Value>): Promise<Value> {
  if (context.db.isTransaction) return work({ ...context, db: context.db as Transaction<DB> });
  return context.db.transaction().execute((db) => work({ ...context, db }));
}
