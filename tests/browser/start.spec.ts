import { type ChildProcess, spawn } from 'node:child_process';
import { promises as fs } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { expect, test } from '@playwright/test';
import { sql } from 'kysely';
import { openDatabase } from '@/db/client';
import { clusterFolder, freePort, runningClusterUrl } from '@/db/cluster';
import { root } from '@/lib/cli/embedded';

test.describe.configure({ mode: 'serial' });
test.setTimeout(300_000);

let dataDir: string;
let port: number;
test.beforeAll(async () => {
  dataDir = await fs.mkdtemp(path.join(os.tmpdir(), 'fullfield-start-'));
  await fs.chmod(dataDir, 0o755);
  port = await freePort();
});
test.afterAll(async () => {
  await fs.rm(clusterFolder(dataDir).folder, { recursive: true, force: true });
  await fs.rm(dataDir, { recursive: true, force: true });
});

type Started = { child: ChildProcess; said: () => string; ended: Promise<number> };

/** As a person's `npm start` in a new window: none of the settings of this test run. */
function start(more: Record<string, string> = {}): Started {
  const env: NodeJS.ProcessEnv = { ...process.env, PORT: String(port), DATA_DIR: dataDir, NEXT_DIST_DIR: '.next-test', ...more };
  for (const name of ['DATABASE_URL', 'SMTP_URL', 'PUBLIC_URL', 'FULLFIELD_KIND', 'NEXTAUTH_SECRET', 'SEAT_KEY']) if (!(name in more)) delete env[name];
  const child = spawn(process.execPath, ['lib/cli/boot.mjs', 'start'], { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] });
  let text = '';
  child.stdout.on('data', (piece: Buffer) => (text += piece.toString()));
  child.stderr.on('data', (piece: Buffer) => (text += piece.toString()));
  return { child, said: () => text, ended: new Promise((resolve) => child.once('exit', (code) => resolve(code ?? -1))) };
}

const ready = async (started: Started) => {
  await Promise.race([
    expect.poll(started.said, { timeout: 240_000 }).toContain(`\nFullfield is ready at http://127.0.0.1:${port}\n`),
    started.ended.then((code) => Promise.reject(new Error(`It ended with ${code}:\n${started.said()}`))),
  ]);
};

async function owner<Value>(work: (db: ReturnType<typeof openDatabase>) => Promise<Value>): Promise<Value> {
  const url = await runningClusterUrl(dataDir);
  if (!url) throw new Error('Its database does not run.');
  const db = openDatabase(url, undefined, { max: 1 });
  return work(db).finally(() => db.destroy());
}

test('starts, says so once, stands a killed worker and database, stops all of it on SIGTERM', async ({ request }) => {
  const first = start();
  await ready(first);
  expect(first.said().match(/is ready at/g)).toHaveLength(1);
  expect((await fs.stat(path.join(dataDir, 'secrets.json'))).mode & 0o777).toBe(0o600);

  const second = start();
  expect(await second.ended).toBe(1);
  expect(second.said()).toContain(`running already at http://127.0.0.1:${port}`);

  await owner((db) => sql`create table mine (n integer)`.execute(db));
  const postmaster = Number((await fs.readFile(path.join(clusterFolder(dataDir).folder, 'files/postmaster.pid'), 'utf8')).split('\n')[0]);
  process.kill(postmaster, 'SIGKILL');
  await expect.poll(async () => (await request.get(`http://127.0.0.1:${port}/api/health`)).status(), { timeout: 60_000 }).toBe(503);
  await expect.poll(async () => (await request.get(`http://127.0.0.1:${port}/api/health`)).json() as Promise<object>, { timeout: 90_000 }).toEqual({ ok: true, workers: 1 });

  first.child.kill('SIGTERM');
  expect(await first.ended).toBe(0);
  expect(await runningClusterUrl(dataDir)).toBeUndefined();
  await expect(fetch(`http://127.0.0.1:${port}/api/health`)).rejects.toThrow();
});

test('starts again with its data', async () => {
  const again = start();
  await ready(again);
  await owner((db) => sql`select n from mine`.execute(db));
  again.child.kill('SIGINT');
  expect(await again.ended).toBe(0);
});

test('refuses what everybody could open', async () => {
  const open = start({ HOST: '0.0.0.0' });
  expect(await open.ended).toBe(1);
  expect(open.said()).toContain('accounts whose passwords everybody knows');
  const guessed = start({ NEXTAUTH_SECRET: 'secretsecretsecretsecretsecretsecret' });
  expect(await guessed.ended).toBe(1);
  expect(guessed.said()).toContain('NEXTAUTH_SECRET is short or easy to guess');
});
