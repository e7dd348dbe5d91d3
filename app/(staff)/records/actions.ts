'use server';

import { revalidatePath } from 'next/cache';
import { z } from 'zod';
import { actionContext } from '@/lib/auth/context';
import { issueReports, sendReportAgain, sendReports } from '@/lib/reports/commands';
import { refuse, type Result } from '@/lib/result';
import { sealResults } from '@/lib/results/commands';

const id = z.guid();
const ids = z.array(id).min(1).max(500);
const unread = () => refuse('unread', 'Choose at least one candidate.');
const people = (count: number): string => (count === 1 ? '1 report' : `${count} reports`);

/** Seals a sitting's results. */
export async function sealAction(sittingId: unknown): Promise<Result<{ moved: number }>> {
  const context = await actionContext('registrar');
  const read = id.safeParse(sittingId);
  if (!context.ok || !read.success) return context.ok ? unread() : context;
  const result = await sealResults(context.value, read.data);
  if (result.ok) revalidatePath('/records', 'layout');
  return result;
}

export type Said = { ok: boolean; says: string };

/** Issues reports for the candidates chosen, and says how many. */
export async function issueReportsAction(sittingId: unknown, again: boolean, candidateIds: unknown): Promise<Said> {
  const context = await actionContext('registrar');
  const read = z.object({ sittingId: id, candidateIds: ids }).safeParse({ sittingId, candidateIds });
  if (!context.ok || !read.success) return context.ok ? unread() : context;
  const result = await issueReports(context.value, { ...read.data, again });
  if (!result.ok) return result;
  revalidatePath('/records', 'layout');
  return { ok: true, says: `${people(result.value.issued)} issued.` };
}

/** Queues the reports of the candidates chosen for sending, and says what became of each. */
export async function sendReportsAction(sittingId: unknown, candidateIds: unknown): Promise<Said> {
  const context = await actionContext('registrar');
  const read = z.object({ sittingId: id, candidateIds: ids }).safeParse({ sittingId, candidateIds });
  if (!context.ok || !read.success) return context.ok ? unread() : context;
  const result = await sendReports(context.value, read.data);
  if (!result.ok) return result;
  revalidatePath('/records', 'layout');
  const { queued, before, withoutAddress, withoutReport } = result.value;
  const rest = [
    before > 0 ? `${people(before)} were sent before.` : '', withoutAddress > 0 ? `${withoutAddress} without an e-mail address.` : '',
    withoutReport > 0 ? `${withoutReport} without a report: issue it first.` : '',
  ].filter(Boolean);
  return { ok: queued > 0, says: [`${people(queued)} queued.`, ...rest].join(' ') };
}

/** Sends a message again that failed or is unsure. */
export async function sendAgainAction(mailId: unknown): Promise<Result<null>> {
  const context = await actionContext('registrar');
  const read = id.safeParse(mailId);
  if (!context.ok || !read.success) return context.ok ? unread() : context;
  const result = await sendReportAgain(context.value, read.data);
  if (result.ok) revalidatePath('/records', 'layout');
  return result;
}
