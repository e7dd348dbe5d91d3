'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { actionContext, type SignedIn } from '@/lib/auth/context';
import { approveExam, askForReview, newExam, retireExam, returnExam, saveExam } from '@/lib/exams/commands';
import { examSheet, examTitle } from '@/lib/exams/model';
import { refuse, type Result } from '@/lib/result';

/** The one shape of these actions: parse, command, revalidate, return. */
async function act<Input, Value>(schema: z.ZodType<Input>, input: unknown, command: (context: SignedIn, input: Input) => Promise<Result<Value>>): Promise<Result<Value>> {
  const context = await actionContext('instructor');
  if (!context.ok) return context;
  const parsed = schema.safeParse(input);
  if (!parsed.success) return refuse('unread', parsed.error.issues[0]?.message ?? 'Look at the fields again.', parsed.error.issues[0]?.path.join('.'));
  const result = await command(context.value, parsed.data);
  if (result.ok) revalidatePath('/exams', 'layout');
  return result;
}

const examId = z.guid();
const note = z.string().max(2_000, 'At most 2,000 characters.');
const revision = z.number().int();

export const newExamAction = async (input: unknown) => act(z.object({ title: examTitle }), input, newExam);
export const saveExamAction = async (input: unknown) =>
  act(z.object({ examId, sheet: examSheet }), input, (context, read) => saveExam(context, read.examId, read.sheet));
export const askForReviewAction = async (input: unknown) =>
  act(z.object({ examId, revision }), input, (context, read) => askForReview(context, read.examId, read.revision));
export const returnExamAction = async (input: unknown) =>
  act(z.object({ examId, note }), input, (context, read) => returnExam(context, read.examId, read.note));
export const approveExamAction = async (input: unknown) =>
  act(z.object({ examId, revision, note }), input, (context, read) => approveExam(context, read.examId, read));
export const retireExamAction = async (input: unknown) => act(z.object({ examId }), input, (context, read) => retireExam(context, read.examId));
