'use server';

import { actionContext } from '@/lib/auth/context';
import { noteRehearsal } from '@/lib/candidates/rehearsal-commands';
import { done, type Result } from '@/lib/result';

/** Notes that this student has rehearsed. */
export async function finishRehearsal(): Promise<Result<number>> {
  const context = await actionContext('student');
  return context.ok ? done(await noteRehearsal(context.value)) : context;
}
