import { refusalResponse, routeContext } from '@/lib/auth/context';
import { readTimeline } from '@/lib/sittings/board-queries';

const id = /^[0-9a-f-]{36}$/;

/** The time line of the sitting, or of the candidate in `?candidate=`. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const context = await routeContext(request, 'proctor', 'instructor', 'registrar');
  if (!context.ok) return refusalResponse(context);
  const candidate = new URL(request.url).searchParams.get('candidate');
  const entries = await readTimeline(context.value, (await params).sittingId, candidate && id.test(candidate) ? candidate : null);
  if (!entries.ok) return refusalResponse(entries);
  return Response.json(entries.value, { headers: { 'cache-control': 'no-store' } });
}
