import pg from 'pg';
import { connectionConfig, type Database } from '@/db/client';
import { sql } from 'kysely';

// First key of the two-key advisory locks that living worker pools hold; the second is the hash of the pool's name.
const LIVING = 7_302;

export type Heartbeat = { stop(): Promise<void> };

/**
 * Shows that the worker pool `name` lives: a session of its own holds an advisory lock, which PostgreSQL drops when the
 * process ends in whatever way. Taken again after the database was away.
 */
export function showLife(url: string, name: string): Heartbeat {
  let stopped = false;
  let client: pg.Client | undefined;
  const connect = async (): Promise<void> => {
    if (stopped) return;
    const fresh = new pg.Client(connectionConfig(url, undefined, 'fullfield worker life'));
    let lost = false;
    const again = () => {
      if (lost) return;
      lost = true;
      fresh.end().catch(() => undefined);
      if (!stopped) setTimeout(() => void connect(), 500);
    };
    fresh.on('error', again);
    fresh.on('end', again);
    try {
      await fresh.connect();
      await fresh.query('select pg_advisory_lock($1::int, hashtext($2))', [LIVING, name]);
      client = fresh;
    } catch {
      again();
    }
  };
  void connect();
  return {
    async stop() {
      stopped = true;
      await client?.end().catch(() => undefined);
    },
  };
}

/** How many worker pools live. */
export async function livingWorkers(db: Database): Promise<number> {
  const { rows } = await sql<{ n: number }>`select count(*)::int as n from pg_locks
    where locktype = 'advisory' and classid = ${LIVING} and granted and database = (select oid from pg_database where datname = current_database())`.execute(db);
  return rows[0]?.n ?? 0;
}

/**
 * Gives back the jobs of worker pools that died. A pool counts as dead when it shows no life now and showed none at the call
 * before (`suspects`), so that a short loss of the connection takes nobody's job away. Returns the pools seen without life.
 * Needs the owner's connection.
 */
export async function releaseDeadWorkers(owner: Database, suspects: ReadonlySet<string>): Promise<Set<string>> {
  const { rows } = await sql<{ pool: string }>`
    select distinct pool from (
      select locked_by as pool from graphile_worker._private_jobs where locked_by is not null
      union select locked_by from graphile_worker._private_job_queues where locked_by is not null
    ) as holders
    where not exists (
      select from pg_locks where locktype = 'advisory' and classid = ${LIVING} and granted
        and objid = (hashtext(pool)::bigint & 4294967295)::oid
        and database = (select oid from pg_database where datname = current_database())
    )`.execute(owner);
  const lifeless = rows.map((row) => row.pool);
  const dead = lifeless.filter((pool) => suspects.has(pool));
  if (dead.length > 0) await sql`select graphile_worker.force_unlock_workers(${dead}::text[])`.execute(owner);
  return new Set(lifeless.filter((pool) => !suspects.has(pool)));
}
