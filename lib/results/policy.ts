import { type Actor, holds } from '@/lib/context';

/** Whose places these are; which sittings stand in them is asked in every query (relation.ts). */
export const mayMark = (actor: Actor): boolean => holds(actor, 'instructor');
export const mayReadRecords = (actor: Actor): boolean => holds(actor, 'instructor', 'registrar');
/** Sealing and grade reports. */
export const mayKeepRecords = (actor: Actor): boolean => holds(actor, 'registrar');
