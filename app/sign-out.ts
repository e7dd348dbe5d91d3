'use server';

import { cookies } from 'next/headers';
import { redirect } from 'next/navigation';
import { endSignIn } from '@/lib/auth/commands';
import { signedIn } from '@/lib/auth/context';
import { signInCookie } from '@/lib/auth/cookies';

/** Ends this browser's sign-in; works without scripts too. */
export async function signOut(): Promise<void> {
  const context = await signedIn();
  if (context) await endSignIn(context.db, context.signInId);
  (await cookies()).delete(signInCookie().name);
  redirect('/sign-in?done=out');
}
