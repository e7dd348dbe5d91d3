import { sql } from 'kysely';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { addJob } from '@/lib/jobs/add';
import { livingWorkers, releaseDeadWorkers, showLife } from '@/lib/jobs/liveness';
import { type RunningWorker, startWorker } from '@/lib/jobs/run';
import { startRounds } from '@/lib/jobs/rounds';
import { queueMail } from '@/lib/mail/commands';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';
import { startTestSink, type TestSink } from '@/tests/support/sink';
import { until } from '@/tests/support/wait';

let database: TestDatabase;
let sink: TestSink;
const workers: RunningWorker[] = [];
beforeAll(async () => {
  database = await openTestDatabase();
  sink = await startTestSink();
  process.env.SMTP_URL = sink.url;
});
afterEach(async () => {
  await Promise.all(workers.splice(0).map((worker) => worker.stop()));
});
afterAll(async () => {
  await sink.close();
  await database.close();
});

const waiting = async (): Promise<number> =>
  (await sql<{ n: number }>`select count(*)::int as n from graphile_worker._private_jobs`.execute(database.owner)).rows[0]?.n ?? -1;

describe('the queue', () => {
  it('keeps one job a key, and admits the application by its function alone', async () => {
    await addJob(database.app, 'send-mail', { mailId: '00000000-0000-4000-8000-000000000001' }, { key: 'one' });
    await addJob(database.app, 'send-mail', { mailId: '00000000-0000-4000-8000-000000000002' }, { key: 'one' });
    expect(await waiting()).toBe(1);
    await expect(sql`select * from graphile_worker._private_jobs`.execute(database.app)).rejects.toThrow(/permission denied/);
    await expect(addJob(database.candidate, 'send-mail', { mailId: '' })).rejects.toThrow(/permission denied/);
  });

  it('is worked by two workers, each message once', async () => {
    workers.push(await startWorker({ url: database.url }), await startWorker({ url: database.url }));
    await until(async () => (await livingWorkers(database.app)) === 2, 60);
    const to = Array.from({ length: 20 }, (_, n) => `apprentice${n}@example.org`);
    for (const address of to) await queueMail(database.app, { kind: 'sitting', to: address, subject: 'Sitting', body: 'Thursday.' });
    await until(async () => (await waiting()) === 0, 60);
    expect(sink.received.map((mail) => mail.to).sort()).toEqual([...to].sort());
  }, 150_000);
});

describe('a worker that died', () => {
  it('loses its jobs to the others after two looks, one that lives keeps them', async () => {
    await addJob(database.app, 'send-mail', { mailId: '00000000-0000-4000-8000-000000000003' }, { heavy: true });
    const life = showLife(database.url, 'pool-living');
    await until(async () => (await livingWorkers(database.app)) === 1);
    const lockAs = (pool: string) => sql`update graphile_worker._private_jobs set locked_by = ${pool}, locked_at = now()`.execute(database.owner);
    const holder = async () => (await sql<{ by: string | null }>`select locked_by as by from graphile_worker._private_jobs`.execute(database.owner)).rows[0]?.by;

    await lockAs('pool-living');
    expect(await releaseDeadWorkers(database.owner, await releaseDeadWorkers(database.owner, new Set()))).toEqual(new Set());
    expect(await holder()).toBe('pool-living');

    await lockAs('pool-dead');
    const suspects = await releaseDeadWorkers(database.owner, new Set());
    expect(suspects).toEqual(new Set(['pool-dead']));
    expect(await holder()).toBe('pool-dead');
    await releaseDeadWorkers(database.owner, suspects);
    expect(await holder()).toBe(null);
    await life.stop();
  });
});

describe('a round', () => {
  it('is made by one process at a time and goes on after an error', async () => {
    let inside = 0;
    let most = 0;
    let runs = 0;
    const told: string[] = [];
    const round = {
      name: 'test',
      every: 0.01,
      async run() {
        most = Math.max(most, (inside += 1));
        await new Promise((resolve) => setTimeout(resolve, 20));
        inside -= 1;
        runs += 1;
        if (runs === 1) throw new Error('once');
      },
    };
    const ends = [1, 2, 3].map(() => startRounds(database.app, [round], (name) => void told.push(name)));
    await until(async () => runs > 5);
    await Promise.all(ends.map((end) => end()));
    expect(most).toBe(1);
    expect(told).toEqual(['test']);
  });
});
