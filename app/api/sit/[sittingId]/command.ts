import { appDb } from '@/db/client';
import type { Seat } from '@/lib/candidates/seat-token';
import type { Context } from '@/lib/context';
import type { Result } from '@/lib/result';
import { answer, noSeat, refusal, seatOf } from './seat';

/** A handler that runs one command of the candidate's seat; the seat token is all its right. */
export const seatCommand =
  (command: (context: Context, seat: Seat) => Promise<Result<unknown>>) =>
  async (request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> => {
    const seat = seatOf(request, (await params).sittingId);
    if (!seat) return noSeat();
    const result = await command({ db: appDb(), actor: { kind: 'system', name: 'seat' } }, seat);
    return result.ok ? answer({ ok: true, value: result.value }) : refusal(result);
  };
