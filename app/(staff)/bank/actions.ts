'use server';

import { revalidatePath } from 'next/cache';
import type { z } from 'zod';
import { actionContext, type SignedIn } from '@/lib/auth/context';
import { cancelCheck, startCheck } from '@/lib/bank/check-commands';
import { bringInFiles, newTemplate, saveDraft } from '@/lib/bank/commands';
import { checkInput, decisionInput, idInput, mostFiles, newTemplateInput, reviewInput, saveInput } from '@/lib/bank/model';
import { decideReview, askForReview, retire, takeBack } from '@/lib/bank/review-commands';
import { refuse, type Result } from '@/lib/result';

/** The one shape of these actions: parse, command, revalidate, return. */
async function act<Input, Value>(schema: z.ZodType<Input>, input: unknown, command: (context: SignedIn, input: Input) => Promise<Result<Value>>): Promise<Result<Value>> {
  const context = await actionContext('instructor');
  if (!context.ok) return context;
  const parsed = schema.safeParse(input);
  if (!parsed.success) return refuse('unread', parsed.error.issues[0]?.message ?? 'Look at the fields again.', String(parsed.error.issues[0]?.path[0] ?? ''));
  const result = await command(context.value, parsed.data);
  if (result.ok) revalidatePath('/bank', 'layout');
  return result;
}

export const newTemplateAction = async (input: unknown) => act(newTemplateInput, input, newTemplate);
export const saveDraftAction = async (input: unknown) => act(saveInput, input, saveDraft);
export const startCheckAction = async (input: unknown) => act(checkInput, input, startCheck);
export const cancelCheckAction = async (input: unknown) => act(idInput, input, cancelCheck);
export const askForReviewAction = async (input: unknown) => act(reviewInput, input, askForReview);
export const decideReviewAction = async (input: unknown) => act(decisionInput, input, decideReview);
export const takeBackAction = async (input: unknown) => act(idInput, input, takeBack);
export const retireAction = async (input: unknown) => act(idInput, input, retire);

/** Saves from a form without JavaScript: the fields id, revision and text. */
export async function saveFormAction(_before: Result<unknown> | null, form: FormData) {
  const text = String(form.get('text') ?? '').replace(/\r\n/g, '\n');
  return saveDraftAction({ id: form.get('id'), revision: Number(form.get('revision')), text });
}

/** Brings in the files of the field `files`. */
export async function bringInFilesAction(_before: unknown, form: FormData) {
  const context = await actionContext('instructor');
  if (!context.ok) return context;
  const files = form.getAll('files').filter((entry): entry is File => entry instanceof File && entry.size > 0);
  const read = await Promise.all(files.slice(0, mostFiles + 1).map(async (file) => ({ name: file.name, text: await file.text() })));
  const result = await bringInFiles(context.value, read);
  if (result.ok) revalidatePath('/bank');
  return result;
}
