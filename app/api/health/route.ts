import { sql } from 'kysely';
import { appDb } from '@/db/client';
import { livingWorkers } from '@/lib/jobs/liveness';

export const dynamic = 'force-dynamic';

/** Whether this server reaches its database, and how many workers live. Tells nothing else, so anybody may ask. */
export async function GET(): Promise<Response> {
  try {
    await sql`select 1`.execute(appDb());
    return Response.json({ ok: true, workers: await livingWorkers(appDb()) }, { headers: { 'cache-control': 'no-store' } });
  } catch {
    return Response.json({ ok: false }, { status: 503, headers: { 'cache-control': 'no-store' } });
  }
}
