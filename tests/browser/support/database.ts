import { sql } from 'kysely';
import { type Database, openDatabase } from '@/db/client';
import { readClock } from '@/db/clock';

let kept: Database | undefined;

/** The installation's database as its owner, for looking behind the pages and for setting its clock. */
export const database = (): Database => (kept ??= openDatabase(process.env.DATABASE_URL ?? '', undefined, { max: 2, name: 'browser tests' }));

export async function closeDatabase(): Promise<void> {
  await kept?.destroy();
  kept = undefined;
}

/** Moves the installation's clock on by so many minutes. */
export const pass = (minutes: number): Promise<unknown> => sql`update app.installation set clock_shift = clock_shift + make_interval(mins => ${minutes})`.execute(database());

/** Gives the installation the true time again; waits that were given out in the shifted time would last for hours. */
export async function trueTime(): Promise<void> {
  await sql`update app.installation set clock_shift = '0'`.execute(database());
  await database().deleteFrom('sign_in_delay').execute();
}

export const serverNow = (): Promise<Date> => readClock(database());
