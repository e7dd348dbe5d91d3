import { refusalResponse, routeContext } from '@/lib/auth/context';
import { savesTopic, sittingTopic } from '@/lib/live/post';
import { eventStream } from '@/lib/live/stream';
import { readBoard } from '@/lib/sittings/board-queries';

/** The board whenever something of the sitting changed in any process; ends when the reader's sign-in does. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const { sittingId } = await params;
  const first = await routeContext(request, 'proctor', 'instructor', 'registrar');
  if (!first.ok) return refusalResponse(first);
  const seen = await readBoard(first.value, sittingId);
  if (!seen.ok) return refusalResponse(seen);
  return eventStream(request, {
    topics: [sittingTopic(sittingId), savesTopic(sittingId)],
    refresh: 10,
    read: async () => {
      const context = await routeContext(request, 'proctor', 'instructor', 'registrar');
      if (!context.ok) return 'end';
      const board = await readBoard(context.value, sittingId);
      return board.ok ? [{ event: 'board', data: board.value, id: String(board.value.number) }] : 'end';
    },
  });
}
