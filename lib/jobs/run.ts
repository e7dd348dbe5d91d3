import { EventEmitter } from 'node:events';
import { run, type TaskList, type WorkerEvents } from 'graphile-worker';
import pg from 'pg';
import { connectionConfig, type Database, openDatabase } from '@/db/client';
import { type Heartbeat, releaseDeadWorkers, showLife } from './liveness';
import { quietLogger } from './logger';
import type { JobName } from './model';
import { rounds, type Round, startRounds } from './rounds';
import { handlers, type JobTools } from './tasks';

export type WorkerOptions = {
  /** The owner's address: the queue's tables admit nobody else. */
  url: string;
  /** Jobs done at once; default 3. */
  concurrency?: number;
  /** Told of what went wrong, one line each. */
  tell?: (line: string) => void;
};

export type RunningWorker = {
  /** Lets jobs under way end (5 s, then they are given back) and closes everything. */
  stop(): Promise<void>;
};

type AnyHandler = (payload: unknown, tools: JobTools) => Promise<void>;

function taskList(db: Database): TaskList {
  const names = Object.keys(handlers) as JobName[];
  // The queue hands out untyped payloads; addJob is the only way in, and it is typed.
  return Object.fromEntries(
    names.map((name) => [
      name,
      (payload, helpers) => (handlers[name] as AnyHandler)(payload, { db, signal: helpers.abortSignal }),
    ]),
  ) as TaskList;
}

const sweeper = (owner: Database): Round => {
  let suspects = new Set<string>();
  return { name: 'release dead workers', every: 5, run: async () => void (suspects = await releaseDeadWorkers(owner, suspects)) };
};

/** Starts taking jobs and making rounds in this process. */
export async function startWorker(options: WorkerOptions): Promise<RunningWorker> {
  const tell = options.tell ?? ((line: string) => process.stderr.write(`${line}\n`));
  const pool = new pg.Pool({ ...connectionConfig(options.url, undefined, 'fullfield worker'), max: 6 });
  pool.on('error', (error) => tell(`worker: ${error.message}`));
  pool.on('connect', (client) => client.on('error', () => undefined));
  const db = openDatabase(options.url, 'fullfield_app', { max: 6, name: 'fullfield jobs' });
  const owner = openDatabase(options.url, undefined, { max: 2, name: 'fullfield rounds' });
  const events = new EventEmitter() as WorkerEvents;
  let life: Heartbeat | undefined;
  events.on('pool:create', ({ workerPool }) => void (life = showLife(options.url, workerPool.id)));
  events.on('job:error', ({ job, error }) =>
    tell(`job ${job.task_identifier} ${job.id} (try ${job.attempts} of ${job.max_attempts}): ${error instanceof Error ? error.message : String(error)}`),
  );
  const runner = await run({
    pgPool: pool,
    taskList: taskList(db),
    concurrency: options.concurrency ?? 3,
    noHandleSignals: true,
    pollInterval: 2000,
    logger: quietLogger,
    events,
  });
  runner.promise.catch((error: unknown) => tell(`worker: ${String(error)}`));
  const complain = (name: string, error: unknown) => tell(`round ${name}: ${error instanceof Error ? error.message : String(error)}`);
  const endRounds = startRounds(db, rounds, complain);
  const endSweeping = startRounds(owner, [sweeper(owner)], complain);
  return {
    async stop() {
      await Promise.all([endRounds(), endSweeping(), runner.stop().catch(() => undefined)]);
      await life?.stop();
      await Promise.all([pool.end(), db.destroy(), owner.destroy()]);
    },
  };
}
