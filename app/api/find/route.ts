import { refusalResponse, routeContext } from '@/lib/auth/context';
import { find } from '@/lib/find/queries';

export async function GET(request: Request): Promise<Response> {
  const context = await routeContext(request, 'instructor', 'proctor', 'registrar');
  if (!context.ok) return refusalResponse(context);
  const hits = await find(context.value, new URL(request.url).searchParams.get('q') ?? '');
  return Response.json({ hits }, { headers: { 'cache-control': 'no-store' } });
}
