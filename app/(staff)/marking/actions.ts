'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { actionContext, type SignedIn } from '@/lib/auth/context';
import type { Role } from '@/lib/context';
import { refuse, type Result } from '@/lib/result';
import { decideClaim, moderateSitting, overrideMark, releaseResults, withholdResult } from '@/lib/results/commands';
import { claimInput, overrideInput, withholdInput } from '@/lib/results/model';

/** The one shape of these actions: parse, command, revalidate, return. */
async function act<Input, Value>(schema: z.ZodType<Input>, input: unknown, command: (context: SignedIn, input: Input) => Promise<Result<Value>>, ...roles: Role[]): Promise<Result<Value>> {
  const context = await actionContext(...roles);
  if (!context.ok) return context;
  const parsed = schema.safeParse(input);
  if (!parsed.success) return refuse('unread', parsed.error.issues[0]?.message ?? 'Look at the fields again.', parsed.error.issues[0]?.path.join('.'));
  const result = await command(context.value, parsed.data);
  if (result.ok) revalidatePath('/marking', 'layout');
  return result;
}

const id = z.guid();

export const overrideMarkAction = async (input: unknown) => act(overrideInput, input, overrideMark, 'instructor');
export const decideClaimAction = async (input: unknown) => act(claimInput, input, decideClaim, 'instructor', 'proctor');
export const withholdResultAction = async (input: unknown) => act(withholdInput, input, withholdResult, 'instructor');
export const moderateAction = async (sittingId: unknown) => act(id, sittingId, moderateSitting, 'instructor');
export const releaseAction = async (sittingId: unknown) => act(id, sittingId, releaseResults, 'instructor');
