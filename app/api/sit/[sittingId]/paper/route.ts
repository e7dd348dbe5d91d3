import { readPaper } from '@/lib/candidates/seat-queries';
import { answer, noSeat, refusal, roomDb, seatOf } from '../seat';

/** The paper with the answers and flags the server has; the browser keeps it for a reload without network. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const seat = seatOf(request, (await params).sittingId);
  if (!seat) return noSeat();
  const paper = await readPaper(roomDb(), seat);
  return paper.ok ? answer({ ok: true, paper: paper.value }) : refusal(paper);
}
