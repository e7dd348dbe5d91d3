import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import type { JobName, JobOptions, JobPayloads } from './model';

/**
 * Puts a job into the queue through `db`; in a transaction it exists only when that commits, and starts at once then.
 * `db` may be the application's role or the owner.
 */
export async function addJob<Name extends JobName>(
  db: Kysely<DB>,
  name: Name,
  payload: JobPayloads[Name],
  options: JobOptions = {},
): Promise<void> {
  const { key = null, heavy = false, runAt = null, maxAttempts = 5, priority = heavy ? 10 : 0 } = options;
  const queue = heavy ? 'heavy' : null;
  await sql`select app.add_job(${name}, ${JSON.stringify(payload)}::json, ${key}, ${queue}, ${runAt}::timestamptz,
    ${maxAttempts}::integer, ${priority}::integer)`.execute(db);
}
