import type { Role } from '@/lib/context';

/** Hours after which a sign-in ends by itself: longer than any day of examination. */
export const signInHours = 12;

/** How failures slow the next try: the first `free` cost nothing, then `first` seconds, doubled each time up to `most`. */
export type Slowing = { free: number; first: number; most: number };

/**
 * Guessing at one account from one address is slowed soonest. The account alone (guessing from many addresses) and the address alone
 * (a whole school behind one) are slowed later and less, so that nobody is locked out by somebody else.
 */
export const slowing = {
  pair: { free: 4, first: 1, most: 60 },
  account: { free: 25, first: 1, most: 20 },
  address: { free: 60, first: 0.25, most: 2 },
} as const satisfies Record<string, Slowing>;

/** Minutes without a failure after which the count begins again. */
export const forgivenAfterMinutes = 30;

/** Seconds until the next try after `failures` failures in a row. */
export function waitAfter(failures: number, { free, first, most }: Slowing): number {
  if (failures <= free) return 0;
  return Math.min(most, first * 2 ** Math.min(failures - free - 1, 30));
}

/** The first place of a person after signing in. */
export function firstPlace(held: ReadonlySet<Role>): string {
  if (held.has('registrar')) return '/people';
  if (held.has('instructor')) return '/bank';
  if (held.has('proctor')) return '/sittings';
  return '/today';
}

/** An address of this application to go to after signing in; anything else is dropped (no redirect to strangers). */
export function safeNext(next: string | undefined | null): string | null {
  if (!next || !/^\/(?![/\\])[\x21-\x7e]*$/.test(next) || next.includes('\\') || next.startsWith('/api/')) return null;
  return next;
}
