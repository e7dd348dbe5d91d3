import { existsSync } from 'node:fs';
import path from 'node:path';
import { sql } from 'kysely';
import { openDatabase } from '@/db/client';
import { isOurs, restoreDatabase } from './dump';
import { dataDirectory, withDatabase } from './embedded';
import { whoRuns } from './running';

const say = (line: string): void => void process.stdout.write(`${line}\n`);
const addressOf = (url: string, database: string): string => Object.assign(new URL(url), { pathname: `/${database}` }).href;

/**
 * Restores beside the database and changes places when it is whole; what stood there is kept under another name until the next
 * restore.
 */
async function exchange(url: string, file: string): Promise<void> {
  const place = new URL(url).pathname.slice(1);
  const [fresh, before] = [`${place}_restoring`, `${place}_before`];
  const admin = openDatabase(addressOf(url, 'postgres'), undefined, { max: 1 });
  try {
    await sql`drop database if exists ${sql.id(fresh)} with (force)`.execute(admin);
    await sql`create database ${sql.id(fresh)}`.execute(admin);
    await restoreDatabase(addressOf(url, fresh), file);
    await sql`drop database if exists ${sql.id(before)} with (force)`.execute(admin);
    await sql`alter database ${sql.id(place)} rename to ${sql.id(before)}`.execute(admin);
    await sql`alter database ${sql.id(fresh)} rename to ${sql.id(place)}`.execute(admin);
  } finally {
    await admin.destroy();
  }
  say(`Restored. What was there before is kept as database ${before} until the next restore.`);
}

/** `npm run restore -- FILE`: puts a backup in the place of the embedded database, or into the empty database of DATABASE_URL. */
async function main(): Promise<number> {
  const file = process.argv[2] && path.resolve(process.argv[2]);
  if (!file || !existsSync(file)) {
    process.stderr.write('Which backup? npm run restore -- FILE (npm run backup puts them into backups/ of the data folder)\n');
    return 1;
  }
  const running = process.env.DATABASE_URL ? undefined : await whoRuns(dataDirectory());
  if (running) {
    process.stderr.write(`Fullfield is running at ${running.address}. Stop it first (Ctrl-C in its window).\n`);
    return 1;
  }
  return withDatabase(async (url, embedded) => {
    if (embedded) {
      await exchange(url, file);
      return 0;
    }
    if (await isOurs(url)) {
      process.stderr.write('The database of DATABASE_URL is not empty. Create an empty one and name that.\n');
      return 1;
    }
    await restoreDatabase(url, file);
    say('Restored.');
    return 0;
  });
}

process.exitCode = await main();
