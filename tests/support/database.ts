import { randomBytes } from 'node:crypto';
import { sql } from 'kysely';
import { inject } from 'vitest';
import { closeDatabases, type Database, openDatabase } from '@/db/client';

export type TestDatabase = {
  /** Address as the owner. */
  url: string;
  owner: Database;
  app: Database;
  candidate: Database;
  /** Sets `app.now()`: to a moment, or moved on by an interval such as '10 minutes'. */
  setClock(to: Date | string): Promise<void>;
  close(): Promise<void>;
};

function addressOf(templateUrl: string, database: string): string {
  const url = new URL(templateUrl);
  url.pathname = `/${database}`;
  return url.href;
}

/**
 * A database of its own for a test file: a clone of the migrated template. `DATABASE_URL` of the file's process points to it
 * until `close()`, so that `appDb()` and `candidateDb()` open it too; the other settings of lib/config are a test's. Call it in `beforeAll`, `close()` in `afterAll`.
 */
export async function openTestDatabase(): Promise<TestDatabase> {
  const templateUrl = inject('templateUrl');
  const template = new URL(templateUrl).pathname.slice(1);
  const name = `t_${randomBytes(8).toString('hex')}`;
  const admin = openDatabase(addressOf(templateUrl, 'postgres'), undefined, { max: 1 });
  await sql`create database ${sql.id(name)} template ${sql.id(template)}`.execute(admin);
  const url = addressOf(templateUrl, name);
  Object.assign(process.env, { PUBLIC_URL: 'https://exams.example.org', FULLFIELD_KIND: 'test', DATABASE_URL: url });
  for (const key of ['NEXTAUTH_SECRET', 'SEAT_KEY']) process.env[key] ??= randomBytes(32).toString('base64url');
  const owner = openDatabase(url, undefined, { max: 3 });
  const app = openDatabase(url, 'fullfield_app');
  const candidate = openDatabase(url, 'fullfield_candidate');
  return {
    url,
    owner,
    app,
    candidate,
    async setClock(to) {
      const shift = to instanceof Date ? sql`${to}::timestamptz - statement_timestamp()` : sql`clock_shift + ${to}::interval`;
      await sql`update app.installation set clock_shift = ${shift}`.execute(owner);
    },
    async close() {
      await Promise.all([owner.destroy(), app.destroy(), candidate.destroy(), closeDatabases()]);
      await sql`drop database ${sql.id(name)} with (force)`.execute(admin);
      await admin.destroy();
    },
  };
}
