import type { LockingContext } from '@/lib/context';
import { accountId } from '@/lib/context';
import { record } from '@/lib/audit/commands';
import { postChangeIn } from '@/lib/live/post';

export type SittingNote = { kind: string; candidateId?: string; data?: Record<string, string | number | boolean | null>; note?: string };

/**
 * Adds to the sitting's time line and to the log, and tells every process. The number is taken under the sitting's row lock,
 * so a later number never becomes visible before an earlier one.
 */
export async function noteSitting(context: LockingContext, sittingId: string, input: SittingNote): Promise<number> {
  const { counter } = await context.db
    .updateTable('sitting')
    .set((eb) => ({ counter: eb('counter', '+', 1) }))
    .where('id', '=', sittingId)
    .returning('counter')
    .executeTakeFirstOrThrow();
  await context.db
    .insertInto('sitting_event')
    .values({
      sitting_id: sittingId, number: counter, kind: input.kind, candidate_id: input.candidateId ?? null,
      actor_id: accountId(context.actor), data: JSON.stringify(input.data ?? {}),
    })
    .execute();
  await record(context, {
    kind: `sitting.${input.kind}`,
    subject: input.candidateId ? 'candidate' : 'sitting',
    subjectId: input.candidateId ?? sittingId,
    data: { ...input.data, sitting: sittingId, number: counter },
    ...(input.note ? { note: input.note } : {}),
  });
  await postChangeIn(context.db, sittingId);
  return counter;
}
