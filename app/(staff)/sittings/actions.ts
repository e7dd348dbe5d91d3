'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { actionContext, type SignedIn } from '@/lib/auth/context';
import { addCandidates, drawPapersAgain, removeCandidate, setSeats } from '@/lib/planning/candidates.commands';
import { cancelSitting, changeSitting, planSitting, renewNeeds } from '@/lib/planning/commands';
import { inviteCandidates } from '@/lib/planning/invite';
import { newSitting, seatList } from '@/lib/planning/model';
import { refuse, type Result } from '@/lib/result';

/** The one shape of these actions: parse, command, revalidate, return. */
async function act<Input, Value>(schema: z.ZodType<Input>, input: unknown, command: (context: SignedIn, input: Input) => Promise<Result<Value>>): Promise<Result<Value>> {
  const context = await actionContext('instructor');
  if (!context.ok) return context;
  const parsed = schema.safeParse(input);
  if (!parsed.success) return refuse('unread', parsed.error.issues[0]?.message ?? 'Look at the fields again.', parsed.error.issues[0]?.path.join('.'));
  const result = await command(context.value, parsed.data);
  if (result.ok) revalidatePath('/sittings', 'layout');
  return result;
}

const id = z.guid();
const sitting = z.object({ sittingId: id });

export const planSittingAction = async (input: unknown) => act(newSitting, input, planSitting);

/** Changes a plan from the same fields that made it; form and class are not among what changes. */
export async function changeSittingAction(sittingId: string, input: unknown): Promise<Result<{ sittingId: string }>> {
  const result = await act(newSitting, input, (context, { formId: _, classId: __, ...change }) => changeSitting(context, sittingId, change));
  return result.ok ? { ok: true, value: { sittingId } } : result;
}

export const cancelSittingAction = async (input: unknown) =>
  act(sitting.extend({ reason: z.string().max(500, 'At most 500 characters.') }), input, (context, read) => cancelSitting(context, read.sittingId, read.reason));
export const setSeatsAction = async (input: unknown) => act(sitting.extend({ seats: seatList }), input, (context, read) => setSeats(context, read.sittingId, read.seats));
export const addCandidatesAction = async (input: unknown) =>
  act(sitting.extend({ accounts: z.array(id).max(500) }), input, (context, read) => addCandidates(context, read.sittingId, read.accounts));
export const removeCandidateAction = async (input: unknown) =>
  act(sitting.extend({ candidateId: id }), input, (context, read) => removeCandidate(context, read.sittingId, read.candidateId));
export const renewNeedsAction = async (input: unknown) => act(sitting, input, (context, read) => renewNeeds(context, read.sittingId));
export const drawPapersAgainAction = async (input: unknown) => act(sitting, input, (context, read) => drawPapersAgain(context, read.sittingId));
export const inviteCandidatesAction = async (input: unknown) => act(sitting, input, (context, read) => inviteCandidates(context, read.sittingId));
