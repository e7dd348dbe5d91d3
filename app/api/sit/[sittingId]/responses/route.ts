import { z } from 'zod';
import { mostRevisionsAtOnce } from '@/lib/candidates/limits';
import { revision } from '@/lib/candidates/model';
import { saveResponses } from '@/lib/candidates/save';
import { postSaved } from '@/lib/live/post';
import { answer, noSeat, refusal, roomDb, seatOf, unreadable } from '../seat';

const body = z.object({ revisions: z.array(revision).min(1).max(mostRevisionsAtOnce) });

/** The one way in for answers. Acknowledges what is durable; sending a revision again is no error. */
export async function POST(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const { sittingId } = await params;
  const seat = seatOf(request, sittingId);
  if (!seat) return noSeat();
  const parsed = body.safeParse(await request.json().catch(() => null));
  if (!parsed.success) return unreadable();
  const outcome = await saveResponses(roomDb(), seat, parsed.data.revisions);
  if (!outcome.ok) return refusal(outcome);
  postSaved(sittingId);
  return answer(outcome);
}
