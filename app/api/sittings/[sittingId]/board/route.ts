import { refusalResponse, routeContext } from '@/lib/auth/context';
import { readBoard } from '@/lib/sittings/board-queries';

/** The board as it stands now: asked at first and while no stream lives. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const context = await routeContext(request, 'proctor', 'instructor', 'registrar');
  if (!context.ok) return refusalResponse(context);
  const board = await readBoard(context.value, (await params).sittingId);
  if (!board.ok) return refusalResponse(board);
  return Response.json(board.value, { headers: { 'cache-control': 'no-store' } });
}
