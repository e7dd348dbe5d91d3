import { refusalResponse, routeContext } from '@/lib/auth/context';
import { paperProgress } from '@/lib/planning/queries';

/** How far the drawing of a sitting's papers is; for whoever may see the sitting. */
export async function GET(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const context = await routeContext(request, 'instructor', 'proctor', 'registrar');
  if (!context.ok) return refusalResponse(context);
  const progress = await paperProgress(context.value, (await params).sittingId);
  return progress.ok ? Response.json(progress.value, { headers: { 'cache-control': 'no-store' } }) : refusalResponse(progress);
}
