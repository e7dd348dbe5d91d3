import { type RawBuilder, sql } from 'kysely';
import { type Actor, accountId, holds } from '@/lib/context';

/** Who may plan a sitting: an instructor of its class. Used inside queries, so that a stranger's class finds nothing. */
export function teachesClass(actor: Actor, column: 'class.id' | 'sitting.class_id'): RawBuilder<boolean> {
  const me = accountId(actor);
  if (!me || !holds(actor, 'instructor')) return sql<boolean>`false`;
  return sql<boolean>`exists (select from class_instructor taught where taught.class_id = ${sql.ref(column)} and taught.account_id = ${me})`;
}
