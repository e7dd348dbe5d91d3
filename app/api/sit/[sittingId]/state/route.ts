import { readRoomState } from '@/lib/candidates/seat-queries';
import { answer, noSeat, refusal, roomDb, seatOf } from '../seat';

/** The candidate's state and the server's time: asked at the start, for measuring the clock, and while no stream lives. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const seat = seatOf(request, (await params).sittingId);
  if (!seat) return noSeat();
  const state = await readRoomState(roomDb(), seat);
  return state.ok ? answer({ ok: true, state: state.value }) : refusal(state);
}
