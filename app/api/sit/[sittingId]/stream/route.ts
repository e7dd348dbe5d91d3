import { markHeard, readRoomState } from '@/lib/candidates/seat-queries';
import { postSaved, sittingTopic } from '@/lib/live/post';
import { eventStream } from '@/lib/live/stream';
import { noSeat, roomDb, seatOf } from '../seat';

/** How often presence is renewed while the stream lives, in seconds; the board calls it lost after three times as long. */
const presence = 10;

/** The candidate's state as it changes; ends when the seat is moved or the candidate withdrawn. The open stream is the sign of life. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const { sittingId } = await params;
  const seat = seatOf(request, sittingId);
  if (!seat) return noSeat();
  return eventStream(request, {
    topics: [sittingTopic(sittingId)],
    refresh: presence,
    read: async () => {
      if (await markHeard(roomDb(), seat)) postSaved(sittingId);
      const state = await readRoomState(roomDb(), seat);
      return state.ok ? [{ event: 'state', data: state.value }] : [{ event: 'moved', data: {} }];
    },
  });
}
