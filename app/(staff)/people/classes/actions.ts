'use server';

import { revalidatePath } from 'next/cache';
import type { SlipBatch } from '@/components/people/MembersLedger';
import { actionContext } from '@/lib/auth/context';
import { endEnrolments, enrol, saveClass, saveTerm, setTermState } from '@/lib/classes/commands';
import type { ClassInput, TermInput } from '@/lib/classes/model';
import type { Context } from '@/lib/context';
import { done, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { showAppointment } from '@/lib/school/times';
import { makeSlips } from '@/lib/slips/commands';

async function asRegistrar<Value>(work: (context: Context) => Promise<Result<Value>>): Promise<Result<Value>> {
  const context = await actionContext('registrar');
  if (!context.ok) return context;
  const result = await work(context.value);
  if (result.ok) revalidatePath('/people', 'layout');
  return result;
}

export const storeTerm = async (id: string | null, input: TermInput) => asRegistrar((context) => saveTerm(context, id, input));
export const moveTerm = async (id: string, state: 'open' | 'ended') => asRegistrar((context) => setTermState(context, id, state));
export const storeClass = async (id: string | null, input: ClassInput) => asRegistrar((context) => saveClass(context, id, input));
export const enrolIn = async (classId: string, ids: string[]) => asRegistrar((context) => enrol(context, classId, ids));
export const takeOutOf = async (classId: string, ids: string[]) => asRegistrar((context) => endEnrolments(context, classId, ids));

/** The slips with their codes, this once, and how long they hold in words. Nothing on the page changes. */
export async function slipsFor(ids: string[]): Promise<Result<SlipBatch>> {
  const context = await actionContext('registrar');
  if (!context.ok) return context;
  const made = await makeSlips(context.value, ids);
  if (!made.ok) return made;
  const { settings } = await readSchool(context.value.db);
  return done({ left: made.value.left, slips: made.value.slips.map(({ expiresAt, ...slip }) => ({ ...slip, until: showAppointment(expiresAt, settings) })) });
}
