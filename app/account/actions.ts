'use server';

import { revalidatePath } from 'next/cache';
import { cookies, headers } from 'next/headers';
import { redirect } from 'next/navigation';
import { changePassword, endAllSignIns } from '@/lib/auth/commands';
import { actionContext } from '@/lib/auth/context';
import { signInCookie } from '@/lib/auth/cookies';
import { type ChangePasswordInput, changePasswordSchema } from '@/lib/auth/model';
import { originOf } from '@/lib/auth/origin';
import { refuse, type Result } from '@/lib/result';

export async function changeOwnPassword(input: ChangePasswordInput): Promise<Result<null>> {
  const context = await actionContext();
  if (!context.ok) return context;
  const read = changePasswordSchema.safeParse(input);
  if (!read.success) return refuse('invalid', read.error.issues[0]?.message ?? 'This password cannot be used.', 'password');
  const from = await headers();
  const changed = await changePassword(context.value, context.value.signInId, read.data, originOf((name) => from.get(name)));
  if (changed.ok) revalidatePath('/account');
  return changed;
}

export async function signOutEverywhere(): Promise<void> {
  const context = await actionContext();
  if (context.ok) await endAllSignIns(context.value);
  (await cookies()).delete(signInCookie().name);
  redirect('/sign-in?done=everywhere');
}
