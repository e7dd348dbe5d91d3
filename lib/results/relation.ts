import { type RawBuilder, sql } from 'kysely';
import { type Actor, accountId, holds } from '@/lib/context';
import { teachesClass } from '@/lib/planning/relation';

/** Sittings whose marking an actor may see and do: those of classes taught. For queries over table `sitting`. */
export const marksSitting = (actor: Actor): RawBuilder<boolean> => teachesClass(actor, 'sitting.class_id');

/** Sittings whose results an actor may read: all for a registrar, those of classes taught for an instructor. Never a key with them. */
export const readsRecords = (actor: Actor): RawBuilder<boolean> => (holds(actor, 'registrar') ? sql<boolean>`true` : marksSitting(actor));

/** Sittings whose results an actor may seal and report on. */
export const keepsRecords = (actor: Actor): RawBuilder<boolean> => sql<boolean>`${sql.lit(holds(actor, 'registrar'))}`;

/** Sittings in which an actor may decide on answers that came after the end: as a proctor assigned, or teaching the class. */
export function decidesClaims(actor: Actor): RawBuilder<boolean> {
  const me = accountId(actor);
  if (!me || !holds(actor, 'proctor')) return marksSitting(actor);
  return sql<boolean>`(${marksSitting(actor)} or exists (select from sitting_proctor watched where watched.sitting_id = sitting.id and watched.account_id = ${me}))`;
}

/** Sittings that have results: a planned or abandoned one has none. */
export const resultSittings = ['closed', 'reconciled'] as const;
