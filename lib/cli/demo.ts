import { sql } from 'kysely';
import { closeDatabases, openDatabase } from '@/db/client';
import { prepareDatabase } from './prepare';

const addressOf = (url: string, database: string): string => Object.assign(new URL(url), { pathname: `/${database}` }).href;

/** Whether nobody has an account yet: a first run. */
export async function isEmpty(url: string): Promise<boolean> {
  const owner = openDatabase(url, undefined, { max: 1 });
  try {
    const { rows } = await sql<{ empty: boolean }>`select not exists (select from account) as empty`.execute(owner);
    return rows[0]?.empty ?? true;
  } finally {
    await owner.destroy();
  }
}

async function fill(url: string, say: (line: string) => void): Promise<void> {
  const owner = openDatabase(url, undefined, { max: 1 });
  await sql`update app.installation set kind = 'demo'`.execute(owner);
  await owner.destroy();
  // The engine behind it is large, and a start with data does not need it.
  const { loadDemo } = await import('@/lib/demo/load');
  const before = process.env.DATABASE_URL;
  process.env.DATABASE_URL = url;
  const db = openDatabase(url, 'fullfield_app');
  try {
    await loadDemo(db, say);
  } finally {
    await db.destroy();
    await closeDatabases();
    if (before === undefined) delete process.env.DATABASE_URL;
    else process.env.DATABASE_URL = before;
  }
}

/**
 * Loads the demo beside the database at `url` and puts it in its place when it is whole, so that a load which breaks off leaves
 * nothing half. What stood in the place before is dropped. For the embedded PostgreSQL only; nobody may be connected.
 */
export async function loadDemoInto(url: string, say: (line: string) => void): Promise<void> {
  const place = new URL(url).pathname.slice(1);
  const loading = `${place}_loading`;
  const admin = openDatabase(addressOf(url, 'postgres'), undefined, { max: 1 });
  try {
    await sql`drop database if exists ${sql.id(loading)} with (force)`.execute(admin);
    await sql`create database ${sql.id(loading)}`.execute(admin);
    await prepareDatabase(addressOf(url, loading));
    await fill(addressOf(url, loading), say);
    await sql`drop database if exists ${sql.id(place)} with (force)`.execute(admin);
    await sql`alter database ${sql.id(loading)} rename to ${sql.id(place)}`.execute(admin);
  } finally {
    await admin.destroy();
  }
}
