import { config } from '@/lib/config';

/** What the framework alone costs: the measure for saves in `npm run bench`. Only in an installation of kind test. */
export async function POST(): Promise<Response> {
  if (config().kind !== 'test') return new Response(null, { status: 404 });
  return Response.json({ ok: true }, { headers: { 'cache-control': 'no-store' } });
}
