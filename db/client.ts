import { Kysely, PostgresDialect, type Transaction } from 'kysely';
import pg from 'pg';
import { preparing } from './prepared';
import type { DB } from './types';

/** A connection of ours; functions that lock rows ask for `Locked` instead, so that the type proves the transaction. */
export type Database = Kysely<DB>;
export type Locked = Transaction<DB>;

/** Roles made by migration 0001. `fullfield_candidate` has no grant on keys. Without a role one is the owner. */
export type DatabaseRole = 'fullfield_app' | 'fullfield_candidate';

export type DatabaseOptions = {
  /** Connections kept at most; default 10. */
  max?: number;
  /** Shown in pg_stat_activity. */
  name?: string;
};

const { builtins } = pg.types;

function readBigint(text: string): number {
  const value = Number(text);
  if (!Number.isSafeInteger(value)) throw new RangeError(`The database returned ${text}, which a number cannot hold exactly.`);
  return value;
}

// numeric becomes a number (marks and percents of at most 8 digits, exact within a double); date stays text (a day has no zone); int8 a number.
const parsers = new Map<number, (text: string) => unknown>([
  [builtins.INT8, readBigint],
  [builtins.NUMERIC, Number],
  [builtins.DATE, (text) => text],
]);

const types: pg.CustomTypesConfig = {
  getTypeParser: ((oid: number, format?: 'text' | 'binary') =>
    (format !== 'binary' && parsers.get(oid)) || pg.types.getTypeParser(oid, format)) as pg.CustomTypesConfig['getTypeParser'],
};

/** Settings of `pg` for one address and role; the listener of lib/live uses them too. */
export function connectionConfig(url: string, role?: DatabaseRole, name = 'fullfield'): pg.ClientConfig {
  return {
    connectionString: url,
    application_name: name,
    options: role === undefined ? undefined : `-c role=${role} -c idle_in_transaction_session_timeout=60000`,
    connectionTimeoutMillis: 10_000,
    keepAlive: true,
    types,
  };
}

/**
 * Opens a pool of its own on the database at `url`, as `role` or as the owner. The caller closes it with `destroy()`.
 * A connection that breaks while idle is dropped and replaced; nothing throws for it.
 */
export function openDatabase(url: string, role?: DatabaseRole, options: DatabaseOptions = {}): Database {
  const pool = new pg.Pool({ ...connectionConfig(url, role, options.name), max: options.max ?? 10, idleTimeoutMillis: 30_000 });
  pool.on('error', () => undefined);
  pool.on('connect', (client) => client.on('error', () => undefined));
  // A candidate's browser asks for the same few things again and again.
  return new Kysely<DB>({ dialect: new PostgresDialect({ pool: role === 'fullfield_candidate' ? preparing(pool) : pool }) });
}

// On globalThis: a development server evaluates modules again and again, and bundles may hold this file twice.
const shared = globalThis as typeof globalThis & { fullfieldDatabases?: Map<string, Database> };

function sharedDatabase(role: DatabaseRole): Database {
  const url = process.env.DATABASE_URL;
  if (!url) throw new Error('DATABASE_URL is not set: start with npm start, or give the address of a PostgreSQL database.');
  const databases = (shared.fullfieldDatabases ??= new Map<string, Database>());
  const key = `${role} ${url}`;
  let database = databases.get(key);
  if (!database) databases.set(key, (database = openDatabase(url, role)));
  return database;
}

/** The pool of this process as the application's role, on `DATABASE_URL`. */
export const appDb = (): Database => sharedDatabase('fullfield_app');

/** The pool of this process as the candidate's role: for everything a candidate's browser asks for during a sitting. */
export const candidateDb = (): Database => sharedDatabase('fullfield_candidate');

/** Closes the pools of this process. */
export async function closeDatabases(): Promise<void> {
  const databases = [...(shared.fullfieldDatabases?.values() ?? [])];
  shared.fullfieldDatabases?.clear();
  await Promise.all(databases.map((database) => database.destroy()));
}
