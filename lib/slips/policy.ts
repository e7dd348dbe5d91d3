import { type Actor, holds } from '@/lib/context';

/** A registrar makes slips for any student; a proctor for candidates of a sitting assigned to them (tested in SQL). */
export const mayMakeSlips = (actor: Actor): boolean => holds(actor, 'registrar', 'proctor');
