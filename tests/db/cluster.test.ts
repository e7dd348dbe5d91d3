import { readFileSync, statSync } from 'node:fs';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { sql } from 'kysely';
import { openDatabase } from '@/db/client';
import { clusterFolder, startCluster } from '@/db/cluster';
import { startTemporaryCluster, type TemporaryCluster } from '@/db/temporary';

let temporary: TemporaryCluster;
let dataDir: string;
beforeAll(async () => {
  temporary = await startTemporaryCluster('cluster');
  dataDir = `/var/tmp/fullfield-temporary-${process.pid}-cluster`;
});
afterAll(() => temporary.remove());

const postmaster = () => Number(readFileSync(`${temporary.cluster.folder}/files/postmaster.pid`, 'utf8').split('\n')[0]);

async function ask<Row>(text: string): Promise<Row[]> {
  const db = openDatabase(temporary.cluster.url, undefined, { max: 1 });
  try {
    return (await sql.raw<Row>(text).execute(db)).rows;
  } finally {
    await db.destroy();
  }
}

describe('the embedded PostgreSQL', () => {
  it('is durable, listens on loopback alone and keeps its password from others', async () => {
    const settings = await ask<{ name: string; setting: string }>(
      `select name, setting from pg_settings where name in ('fsync', 'synchronous_commit', 'full_page_writes', 'listen_addresses', 'data_checksums') order by name`,
    );
    expect(Object.fromEntries(settings.map(({ name, setting }) => [name, setting]))).toEqual({
      data_checksums: 'on', fsync: 'on', full_page_writes: 'on', listen_addresses: '127.0.0.1', synchronous_commit: 'on',
    });
    expect(statSync(`${dataDir}/postgres-password`).mode & 0o777).toBe(0o600);
    const wrong = new URL(temporary.cluster.url);
    wrong.password = 'guess';
    const db = openDatabase(wrong.href, undefined, { max: 1 });
    await expect(sql`select 1`.execute(db)).rejects.toThrow(/password authentication failed/);
    await db.destroy();
  });

  it('is used as it is when it runs already', async () => {
    expect(await startCluster({ dataDir })).toMatchObject({ started: false, port: temporary.cluster.port });
  });

  it('has every committed row after kill -9, on the same port', async () => {
    await ask('create table kept (n integer)');
    for (let n = 0; n < 3; n += 1) {
      await ask(`insert into kept values (${n})`);
      process.kill(postmaster(), 'SIGKILL');
      expect(await startCluster({ dataDir, port: temporary.cluster.port })).toMatchObject({ started: true, port: temporary.cluster.port });
    }
    expect(await ask('select n from kept order by n')).toEqual([{ n: 0 }, { n: 1 }, { n: 2 }]);
  }, 120_000);

  it('goes to /var/tmp when the user postgres could not walk to its folder', () => {
    if (process.getuid?.() !== 0) return expect(clusterFolder('/root/x').moved).toBe(false);
    expect(statSync('/root').mode & 0o001).toBe(0);
    expect(clusterFolder('/root/fullfield/.data')).toMatchObject({ moved: true, folder: expect.stringMatching(/^\/var\/tmp\/fullfield-[0-9a-f]{12}$/) });
    expect(clusterFolder('/var/tmp/x')).toEqual({ moved: false, folder: '/var/tmp/x/postgres' });
  });
});
