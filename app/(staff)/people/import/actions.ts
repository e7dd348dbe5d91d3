'use server';

import { revalidatePath } from 'next/cache';
import { actionContext } from '@/lib/auth/context';
import { refuse, type Result } from '@/lib/result';
import { dropRoster, previewRoster, takeRoster } from '@/lib/rosters/commands';
import type { RosterTaken } from '@/lib/rosters/model';

export async function preview(form: FormData): Promise<Result<{ id: string }>> {
  const context = await actionContext('registrar');
  if (!context.ok) return context;
  const file = form.get('file');
  const termId = form.get('termId');
  if (!(file instanceof File) || typeof termId !== 'string') return refuse('invalid', 'Choose a file and a term.', 'file');
  const bytes = new Uint8Array(await file.arrayBuffer());
  return previewRoster(context.value, { fileName: file.name, bytes, termId, makeClasses: form.has('makeClasses'), invite: form.has('invite') });
}

export async function takeIn(id: string): Promise<Result<RosterTaken>> {
  const context = await actionContext('registrar');
  if (!context.ok) return context;
  const taken = await takeRoster(context.value, id);
  if (taken.ok) revalidatePath('/people', 'layout');
  return taken;
}

export async function drop(id: string): Promise<Result<null>> {
  const context = await actionContext('registrar');
  return context.ok ? dropRoster(context.value, id) : context;
}
