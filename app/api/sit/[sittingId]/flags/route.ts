import { flagChange } from '@/lib/candidates/model';
import { saveFlag } from '@/lib/candidates/save';
import { answer, noSeat, refusal, roomDb, seatOf, unreadable } from '../seat';

/** Keeps that a question is flagged for later, or no longer. */
export async function POST(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const seat = seatOf(request, (await params).sittingId);
  if (!seat) return noSeat();
  const parsed = flagChange.safeParse(await request.json().catch(() => null));
  if (!parsed.success) return unreadable();
  const open = await saveFlag(roomDb(), seat, parsed.data);
  return open ? answer({ ok: true }) : refusal({ ok: false, code: 'stopped', says: 'The paper is closed or its clock stands.' });
}
