import { refuse, done, type Result } from '@/lib/result';
import type { AccountState } from './model';

export type AccountEvent = 'join' | 'close' | 'reopen';

/**
 * The next state of an account: invited → active (a link or a slip was used), invited | active → closed,
 * closed → active where it has a password or was in use, else invited.
 */
export function nextAccountState(state: AccountState, event: AccountEvent, hasPassword: boolean): Result<AccountState, 'not-in-this-state'> {
  if (event === 'join' && state !== 'closed') return done('active');
  if (event === 'close' && state !== 'closed') return done('closed');
  if (event === 'reopen' && state === 'closed') return done(hasPassword ? 'active' : 'invited');
  return refuse('not-in-this-state', `This account is ${state}; load the page again to see it as it is.`);
}
