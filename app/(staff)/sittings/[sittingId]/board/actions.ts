'use server';

import { actionContext } from '@/lib/auth/context';
import { isId } from '@/lib/ids';
import { notFound, refuse, type Result } from '@/lib/result';
import { boardAction, type BoardAction } from '@/lib/sittings/board-actions';
import { runBoardAction } from '@/lib/sittings/run-action';

/** Does one thing of the board. What comes of it arrives on the board's own stream. */
export async function actOnBoard(sittingId: string, action: BoardAction): Promise<Result<null>> {
  const context = await actionContext('proctor');
  if (!context.ok) return context;
  const parsed = boardAction.safeParse(action);
  if (!parsed.success) return refuse('unreadable', parsed.error.issues[0]?.message ?? 'Look at what you entered.');
  if (!isId(sittingId)) return notFound();
  const result = await runBoardAction(context.value, sittingId, parsed.data);
  return result.ok ? { ok: true, value: null } : result;
}
