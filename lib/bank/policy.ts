import { type Actor, holds } from '@/lib/context';

/** The bank holds keys: instructors only. Everybody else finds nothing there. */
export const mayUseBank = (actor: Actor): boolean => holds(actor, 'instructor');

/** A version is decided by a second instructor: nobody who wrote any of its text and not the one who asked. */
export const mayDecide = (actor: Actor, version: { askedBy: string; writers: readonly string[] }): boolean =>
  actor.kind === 'account' && mayUseBank(actor) && actor.id !== version.askedBy && !version.writers.includes(actor.id);
