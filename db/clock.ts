import { type Kysely, sql } from 'kysely';

/** The time on the database server's clock: the only clock that means anything. */
export async function readClock<Schema>(db: Kysely<Schema>): Promise<Date> {
  const { rows } = await sql<{ now: Date }>`select app.now() as now`.execute(db);
  const row = rows[0];
  if (!row) throw new Error('app.now() returned no row.');
  return row.now;
}
