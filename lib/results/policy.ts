import { type Actor, holds } from '@/lib/context';

/** Who may read records at all; which sittings is asked in every query (relation.ts). */
export const mayReadRecords = (actor: Actor): boolean => holds(actor, 'instructor', 'registrar');
