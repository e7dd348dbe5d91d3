import { type Kysely, sql } from 'kysely';
import type { DB } from './types';

/** The time on the database server's clock: the only clock that means anything. */
export async function readClock(db: Kysely<DB>): Promise<Date> {
  const { rows } = await sql<{ now: Date }>`select app.now() as now`.execute(db);
  const row = rows[0];
  if (!row) throw new Error('app.now() returned no row.');
  return row.now;
}
