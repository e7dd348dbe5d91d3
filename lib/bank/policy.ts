import { type Actor, holds } from '@/lib/context';

/** The bank holds keys: instructors only. Everybody else finds nothing there. */
export const mayUseBank = (actor: Actor): boolean => holds(actor, 'instructor');

type Reviewed = { askedBy: string; writers: readonly string[] };

/** Who stands behind a version: everybody who wrote any of its text, and the one who asked for its review. */
export const isAuthor = (account: string, version: Reviewed): boolean => account === version.askedBy || version.writers.includes(account);

/** A version is decided by a second instructor. */
export const mayDecide = (actor: Actor, version: Reviewed): boolean => actor.kind === 'account' && mayUseBank(actor) && !isAuthor(actor.id, version);
