'use server';

import { revalidatePath } from 'next/cache';
import { actionContext } from '@/lib/auth/context';
import { refuse, type Result } from '@/lib/result';
import { saveSchool } from '@/lib/school/commands';
import { schoolForm, type SchoolInput } from '@/lib/school/model';

export async function storeSchool(input: SchoolInput): Promise<Result<{ version: number }>> {
  const context = await actionContext('registrar');
  if (!context.ok) return context;
  const read = schoolForm.safeParse(input);
  if (!read.success) return refuse('invalid', read.error.issues[0]?.message ?? 'This cannot be read.', read.error.issues[0]?.path.map(String).join('.'));
  const saved = await saveSchool(context.value, read.data);
  if (saved.ok) revalidatePath('/', 'layout');
  return saved;
}
