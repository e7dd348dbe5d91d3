import { mkdtemp, rm, stat } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { sql } from 'kysely';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { type Database, openDatabase } from '@/db/client';
import { startTemporaryCluster, type TemporaryCluster } from '@/db/temporary';
import { dumpDatabase, isOurs, restoreDatabase } from '@/lib/cli/dump';
import { queueMail } from '@/lib/mail/commands';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';

let database: TestDatabase;
let elsewhere: TemporaryCluster;
let folder: string;
beforeAll(async () => {
  database = await openTestDatabase();
  // Another server, where none of our roles exist, as on a new machine.
  elsewhere = await startTemporaryCluster('restore');
  folder = await mkdtemp(path.join(os.tmpdir(), 'fullfield-backup-'));
});
afterAll(async () => {
  await database.close();
  await elsewhere.remove();
  await rm(folder, { recursive: true, force: true });
});

async function contents(db: Database): Promise<Record<string, unknown>> {
  const { rows } = await sql<{ name: string }>`select format('%I.%I', table_schema, table_name) as name from information_schema.tables
    where table_schema in ('public', 'app') and table_type = 'BASE TABLE' order by 1`.execute(db);
  const digests = rows.map(async ({ name }) => {
    const all = await sql<{ digest: string }>`select md5(coalesce(string_agg(t::text, '' order by t::text), '')) as digest from ${sql.raw(name)} as t`.execute(db);
    return [name, all.rows[0]?.digest] as const;
  });
  return Object.fromEntries(await Promise.all(digests));
}

it('a backup restored on another server has every row, the queue, and what each role may do', async () => {
  await sql`insert into account (name, sort_name, email) values ('Zoë Ångström', 'angstrom zoe', 'zoe@example.org')`.execute(database.app);
  await queueMail(database.app, { kind: 'sitting', to: 'zoe@example.org', subject: 'Sitting', body: 'Thursday, Ω.' });
  const file = path.join(folder, 'all.dump');
  await dumpDatabase(database.url, file);
  expect((await stat(file)).mode & 0o077).toBe(0);

  const { url } = elsewhere.cluster;
  expect(await isOurs(url)).toBe(false);
  await restoreDatabase(url, file);
  const owner = openDatabase(url, undefined, { max: 2 });
  const [app, candidate] = [openDatabase(url, 'fullfield_app', { max: 1 }), openDatabase(url, 'fullfield_candidate', { max: 1 })];
  try {
    expect(await contents(owner)).toEqual(await contents(database.owner));
    const jobs = await sql<{ n: number }>`select count(*)::int as n from graphile_worker._private_jobs`.execute(owner);
    expect(jobs.rows[0]?.n).toBe(1);
    expect(await queueMail(app, { kind: 'sitting', to: 'zoe@example.org', subject: 'Again', body: 'Friday.' })).toMatchObject({ ok: true });
    await expect(sql`select * from paper_key`.execute(candidate)).rejects.toThrow(/permission denied/);
    await expect(sql`delete from event`.execute(app)).rejects.toThrow(/permission denied/);
    await sql`create table later (id integer)`.execute(owner);
    await sql`select * from later`.execute(app);
  } finally {
    await Promise.all([owner.destroy(), app.destroy(), candidate.destroy()]);
  }
});
