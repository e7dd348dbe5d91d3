import { execFile } from 'node:child_process';
import { promises as fs } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { promisify } from 'node:util';
import { sql } from 'kysely';
import { openDatabase } from '@/db/client';
import { findBinaries } from '@/db/cluster';
import { prepareDatabase } from './prepare';

const run = promisify(execFile);

function toolPath(name: 'pg_dump' | 'pg_restore'): string {
  const bin = findBinaries();
  return bin ? path.join(bin, name) : name;
}

/** PostgreSQL's own program; the password goes by the environment, since arguments can be read by everybody on the machine. */
async function tool(name: 'pg_dump' | 'pg_restore', url: string, args: string[]): Promise<string> {
  const address = new URL(url);
  const password = decodeURIComponent(address.password);
  address.password = '';
  const { stdout } = await run(toolPath(name), ['--dbname', address.href, ...args], {
    env: { ...process.env, PGPASSWORD: password },
    maxBuffer: 64 * 1024 * 1024,
  });
  return stdout;
}

/** Writes the whole database at `url` (owner's address) into `file`, in PostgreSQL's custom format, readable by this user only. */
export async function dumpDatabase(url: string, file: string): Promise<void> {
  await fs.mkdir(path.dirname(file), { recursive: true });
  const unfinished = `${file}.part`;
  await fs.writeFile(unfinished, '', { mode: 0o600 });
  await tool('pg_dump', url, ['--format=custom', '--no-owner', '--file', unfinished]);
  await fs.rename(unfinished, file);
}

// What a dump cannot carry: roles belong to the server, and default privileges to the owner's name there.
async function makeRoles(url: string): Promise<void> {
  const owner = openDatabase(url, undefined, { max: 1 });
  try {
    for (const role of ['fullfield_app', 'fullfield_candidate']) {
      const { rows } = await sql`select from pg_roles where rolname = ${role}`.execute(owner);
      if (rows.length === 0) await sql`create role ${sql.id(role)} nologin`.execute(owner);
    }
    await sql`grant fullfield_app, fullfield_candidate to current_user`.execute(owner);
  } finally {
    await owner.destroy();
  }
}

async function setDefaults(url: string): Promise<void> {
  const owner = openDatabase(url, undefined, { max: 1 });
  try {
    await sql`alter default privileges in schema public grant select, insert, update, delete on tables to fullfield_app`.execute(owner);
    await sql`alter default privileges in schema public grant usage, select on sequences to fullfield_app`.execute(owner);
  } finally {
    await owner.destroy();
  }
}

/** Fills the empty database at `url` from `file` and migrates it. Throws when anything of it cannot be restored. */
export async function restoreDatabase(url: string, file: string): Promise<void> {
  await makeRoles(url);
  const folder = await fs.mkdtemp(path.join(os.tmpdir(), 'fullfield-restore-'));
  try {
    const everything = (await run(toolPath('pg_restore'), ['--list', file])).stdout;
    const list = path.join(folder, 'list');
    const wanted = everything.split('\n').filter((line) => !/ DEFAULT ACL | SCHEMA - public | COMMENT - SCHEMA public /.test(line));
    await fs.writeFile(list, wanted.join('\n'));
    await tool('pg_restore', url, ['--no-owner', '--exit-on-error', '--single-transaction', '--use-list', list, file]);
  } finally {
    await fs.rm(folder, { recursive: true, force: true });
  }
  await setDefaults(url);
  await prepareDatabase(url);
}

/** Whether the database at `url` holds tables of ours. */
export async function isOurs(url: string): Promise<boolean> {
  const owner = openDatabase(url, undefined, { max: 1 });
  try {
    const { rows } = await sql<{ there: boolean }>`select to_regclass('public.account') is not null as there`.execute(owner);
    return rows[0]?.there ?? false;
  } finally {
    await owner.destroy();
  }
}
