import { signIn } from 'next-auth/react';
import type { SignInInput, SlipInput } from './model';

/** Words of a refusal, or null when signed in. The page to go to is asked from the server (`/`), which knows the roles. */
async function attempt(provider: 'password' | 'slip', input: Record<string, string>): Promise<string | null> {
  try {
    const answer = await signIn(provider, { ...input, redirect: false, callbackUrl: '/' });
    if (answer?.ok && !answer.error) return null;
    return answer?.error ?? 'The server did not answer. Try again.';
  } catch {
    return 'The server cannot be reached. Check the network, then try again: what you typed stays here.';
  }
}

export const signInByPassword = (input: SignInInput): Promise<string | null> => attempt('password', input);
export const signInBySlip = (input: SlipInput): Promise<string | null> => attempt('slip', input);

/** Goes to another page by a full navigation, so that nothing of an earlier person stays in the browser's memory. */
export const leaveFor = (address: string): void => window.location.assign(address);
