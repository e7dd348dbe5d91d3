import type { ExpressionBuilder } from 'kysely';
import type { DB } from '@/db/types';
import { type Actor, holds } from '@/lib/context';

/**
 * Which sittings an actor may see: a proctor the assigned ones, an instructor those of own classes, a registrar all.
 * Used inside every query, so that a stranger's sitting and one that does not exist look alike.
 */
export function maySeeSitting(actor: Actor) {
  return (eb: ExpressionBuilder<DB, 'sitting'>) => {
    if (actor.kind === 'system' || holds(actor, 'registrar')) return eb.lit(true);
    const ways = [];
    if (actor.roles.has('proctor')) ways.push(eb.exists(eb.selectFrom('sitting_proctor').select('account_id').whereRef('sitting_id', '=', 'sitting.id').where('account_id', '=', actor.id)));
    if (actor.roles.has('instructor')) ways.push(eb.exists(eb.selectFrom('class_instructor').select('account_id').whereRef('class_id', '=', 'sitting.class_id').where('account_id', '=', actor.id)));
    return ways.length > 0 ? eb.or(ways) : eb.lit(false);
  };
}

/** Who may act in the room: the proctors assigned to the sitting, and nobody else. */
export function mayRunSitting(actor: Actor) {
  return (eb: ExpressionBuilder<DB, 'sitting'>) => {
    if (actor.kind === 'system') return eb.lit(true);
    if (!holds(actor, 'proctor')) return eb.lit(false);
    return eb.exists(eb.selectFrom('sitting_proctor').select('account_id').whereRef('sitting_id', '=', 'sitting.id').where('account_id', '=', actor.id));
  };
}
