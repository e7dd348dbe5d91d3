import { runMigrations } from 'graphile-worker';
import { type Kysely, sql } from 'kysely';
import { quietLogger } from './logger';

/**
 * Makes or updates the queue's own tables and `app.add_job`, the one way by which the application puts a job there.
 * The queue's tables admit their owner only, so the function runs with the owner's rights. Needs the owner's connection
 * and address; doing it twice changes nothing.
 */
export async function installQueue<Schema>(owner: Kysely<Schema>, url: string): Promise<void> {
  await runMigrations({ connectionString: url, logger: quietLogger });
  await sql`
    create or replace function app.add_job(
      name text, payload json, job_key text, queue_name text, run_at timestamptz, max_attempts integer, priority integer
    ) returns bigint language sql security definer set search_path = graphile_worker, pg_temp as $$
      select (graphile_worker.add_job(
        identifier => name, payload => payload, queue_name => queue_name,
        run_at => run_at - (select clock_shift from app.installation), max_attempts => max_attempts,
        job_key => job_key, priority => priority, job_key_mode => 'replace'
      )).id
    $$`.execute(owner);
  await sql`revoke all on function app.add_job from public`.execute(owner);
  await sql`grant execute on function app.add_job to fullfield_app`.execute(owner);
}
