import { promises as fs } from 'node:fs';
import path from 'node:path';
import { expect, test } from '@playwright/test';
import { type Database, openDatabase } from '@/db/client';
import { freePort, startCluster } from '@/db/cluster';
import { startTemporaryCluster, type TemporaryCluster } from '@/db/temporary';
import { freshSecrets, type Installation, startApp } from '../support/app';
import { testData, testDist } from '../support/browser.global';
import { prepareTemplate } from '../support/cluster';
import { makeRunningRoom, seatCookieOf } from '../support/running-room';
import { type Sent, startSteadyWriter, type SteadyWriter } from '../support/steady-writer';
import { until } from '../support/wait';

test.setTimeout(600_000);

const kills = ['first', 'database', 'second', 'database', 'first', 'database', 'second', 'database', 'both', 'database'] as const;
type App = Awaited<ReturnType<typeof startApp>>;

let temporary: TemporaryCluster;
let owner: Database;
let installation: Installation;
let ports: [number, number];
const apps = new Map<number, App>();

test.beforeAll(async () => {
  temporary = await startTemporaryCluster('kills');
  await prepareTemplate(temporary.cluster.url);
  owner = openDatabase(temporary.cluster.url, undefined, { max: 2 });
  ports = [await freePort(), await freePort()];
  const dataDir = path.join(testData, 'kills');
  await fs.mkdir(dataDir, { recursive: true });
  installation = { databaseUrl: temporary.cluster.url, publicUrl: `http://127.0.0.1:${ports[0]}`, smtpUrl: '', dataDir, distDir: testDist, secrets: freshSecrets() };
  for (const port of ports) apps.set(port, await startApp(installation, port));
});
test.afterAll(async () => {
  await Promise.all([...apps.values()].map((app) => app.end('SIGKILL')));
  await owner?.destroy();
  await temporary?.remove();
});

async function killApp(port: number): Promise<void> {
  await apps.get(port)?.end('SIGKILL');
  apps.set(port, await startApp(installation, port));
}

/** Kills every process of PostgreSQL, the first one first, and starts it again on its files. */
async function killDatabase(): Promise<void> {
  const { folder, port } = temporary.cluster;
  const postmaster = Number((await fs.readFile(path.join(folder, 'files/postmaster.pid'), 'utf8')).split('\n')[0]);
  const children = (await fs.readFile(`/proc/${postmaster}/task/${postmaster}/children`, 'utf8')).trim().split(' ').map(Number);
  for (const pid of [postmaster, ...children]) {
    try {
      process.kill(pid, 'SIGKILL');
    } catch (error) {
      // It went by itself when the first one did.
      if ((error as NodeJS.ErrnoException).code !== 'ESRCH') throw error;
    }
  }
  await startCluster({ dataDir: path.dirname(folder), port });
}

const keyOf = (one: Sent): string => `${one.candidateId} ${one.question} ${one.part} ${one.sequence}`;
const stored = async (): Promise<Sent[]> => owner.selectFrom('response').select(['candidate_id as candidateId', 'question', 'part', 'sequence', 'answer']).execute();

/** What is wrong with the rows of the database, measured by what was sent and acknowledged before they were read. */
async function faults(writers: readonly SteadyWriter[]): Promise<string[]> {
  const acknowledged = writers.flatMap((writer) => [...writer.acknowledged]);
  const rows = await stored();
  const sent = new Map(writers.flatMap((writer) => writer.sent).map((one) => [keyOf(one), one.answer]));
  const there = new Map(rows.map((row) => [keyOf(row), row.answer]));
  return [
    ...acknowledged.filter((one) => there.get(keyOf(one)) !== one.answer).map((one) => `acknowledged, but ${there.has(keyOf(one)) ? 'altered' : 'lost'}: ${keyOf(one)}`),
    ...rows.filter((row) => sent.get(keyOf(row)) !== row.answer).map((row) => `never sent so: ${keyOf(row)}`),
    ...(there.size === rows.length ? [] : [`${rows.length - there.size} stored twice`]),
  ];
}

test('ten kills of servers and of PostgreSQL during saves: what was acknowledged is there, once and unaltered', async () => {
  const app = openDatabase(temporary.cluster.url, 'fullfield_app', { max: 2 });
  const { seated } = await makeRunningRoom(owner, app, 6);
  await app.destroy();
  const urls = ports.map((port) => `http://127.0.0.1:${port}`);
  const cookieOf = (place: number) => seatCookieOf(seated[place]!.seat, installation.secrets.SEAT_KEY);
  const writers = seated.map((one, place) => startSteadyWriter(one, cookieOf(place), urls));
  const count = () => writers.reduce((sum, writer) => sum + writer.acknowledged.length, 0);
  for (const kill of kills) {
    const before = count();
    await until(async () => count() > before + 60, 60);
    if (kill === 'database') await killDatabase();
    else await Promise.all(ports.filter((_, place) => kill === 'both' || (kill === 'first') === (place === 0)).map(killApp));
    expect(await faults(writers), `after a kill of ${kill}`).toEqual([]);
  }
  const last = count();
  await until(async () => count() > last + 60, 60);
  await Promise.all(writers.map((writer) => writer.finish()));
  expect(writers.every((writer) => writer.unanswered > 0), 'every writer met a kill').toBe(true);
  expect(await faults(writers)).toEqual([]);
  // Everything that was ever sent was acknowledged in the end, so the rows are exactly those.
  expect((await stored()).map(keyOf).sort()).toEqual(writers.flatMap((writer) => writer.sent).map(keyOf).sort());
  for (const [place, writer] of writers.entries()) {
    const response = await fetch(`${urls[1]}/api/sit/${seated[place]!.seat.sittingId}/paper`, { headers: { cookie: cookieOf(place) } });
    const { paper } = (await response.json()) as { paper: { answers: { question: number; part: string; answer: string }[] } };
    for (const { question, part, answer } of paper.answers) {
      expect(answer).toBe(writer.sent.filter((one) => one.question === question && one.part === part).at(-1)?.answer);
    }
  }
});
