import { appendFile } from 'node:fs/promises';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { sql } from 'kysely';
import type { Database } from '@/db/client';
import { sealEvents } from '@/lib/audit/commands';
import { chainHead } from '@/lib/audit/queries';
import { config } from '@/lib/config';
import { recordEnds } from '@/lib/sittings/commands';

/** Something small that is done again and again, by one worker at a time. */
export type Round = {
  name: string;
  /** Pause between two runs in seconds. */
  every: number;
  run(db: Database): Promise<unknown>;
};

/**
 * Seals the log and writes the new head of its chain into a file beside the database: whoever owns the database could compute
 * the chain anew, but not what stands elsewhere. The operator keeps a copy of the file on another machine.
 */
async function sealLog(db: Database): Promise<void> {
  if ((await sealEvents(db)) === 0) return;
  const head = await chainHead(db);
  if (head) await appendFile(path.join(config().dataDir, 'log-heads.txt'), `${head.number} ${head.digest}\n`);
}

export const rounds: readonly Round[] = [
  { name: 'seal the log', every: 1, run: sealLog },
  { name: 'record the ends of papers', every: 2, run: (db) => recordEnds({ db, actor: { kind: 'system', name: 'worker' } }) },
];

/** Runs `round` once, unless another worker is at it: the lock is the database's and ends with this connection. */
async function runOnce(db: Database, round: Round): Promise<void> {
  await db.connection().execute(async (connection) => {
    const lock = sql`hashtextextended(${`round ${round.name}`}, 0)`;
    const { rows } = await sql<{ held: boolean }>`select pg_try_advisory_lock(${lock}) as held`.execute(connection);
    if (!rows[0]?.held) return;
    try {
      await round.run(db);
    } finally {
      await sql`select pg_advisory_unlock(${lock})`.execute(connection);
    }
  });
}

/** Begins all rounds; the returned function ends them and waits for what is under way. An error is told and the round goes on. */
export function startRounds(db: Database, all: readonly Round[], tell: (name: string, error: unknown) => void): () => Promise<void> {
  const stopping = new AbortController();
  const loop = async (round: Round) => {
    while (!stopping.signal.aborted) {
      await runOnce(db, round).catch((error: unknown) => tell(round.name, error));
      await sleep(round.every * 1000, undefined, { signal: stopping.signal }).catch(() => undefined);
    }
  };
  const loops = all.map(loop);
  return async () => {
    stopping.abort();
    await Promise.all(loops);
  };
}
