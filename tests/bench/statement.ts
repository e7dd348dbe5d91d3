import { execFile } from 'node:child_process';
import { promises as fs } from 'node:fs';
import os from 'node:os';
import path from 'node:path';
import { type CompiledQuery, DummyDriver, Kysely, PostgresAdapter, PostgresIntrospector, PostgresQueryCompiler } from 'kysely';
import { findBinaries } from '@/db/cluster';
import type { DB } from '@/db/types';
import { saveResponses } from '@/lib/candidates/save';
import type { Seat } from '@/lib/candidates/seat-token';

/** The statement that a save sends, as the program itself writes it, with its parameters in order. */
async function savingStatement(seat: Seat): Promise<CompiledQuery> {
  const sent: CompiledQuery[] = [];
  const db = new Kysely<DB>({
    dialect: {
      createAdapter: () => new PostgresAdapter(),
      createDriver: () => new DummyDriver(),
      createIntrospector: (of) => new PostgresIntrospector(of),
      createQueryCompiler: () => new PostgresQueryCompiler(),
    },
    log: ({ query }) => void sent.push(query),
  });
  // Nothing answers, so the save finds no row and says so.
  await saveResponses(db, seat, [{ question: 2, part: 'b', sequence: 1, answer: '12.5 A', typedAt: 0 }]).catch(() => undefined);
  const [statement] = sent;
  if (!statement) throw new Error('A save sent no statement.');
  return statement;
}

/** The same as a script of pgbench: a new sequence at each turn. */
async function scriptFor(seat: Seat): Promise<string> {
  const { sql, parameters } = await savingStatement(seat);
  const revision = `json_build_array(json_build_object('question', 2, 'part', 'b', 'sequence', :sequence::bigint, 'answer', '12.5 A'))::text`;
  const text = sql.replace(/\$(\d+)/g, (_, digits: string) => {
    const value = parameters[Number(digits) - 1];
    if (typeof value === 'string' && value.startsWith('[')) return revision;
    return typeof value === 'number' ? String(value) : `'${String(value)}'`;
  });
  return `\\set sequence random(1000000000, 9000000000000)\n${text};\n`;
}

/** The save's statement a second by pgbench: `connections` clients, prepared, each turn one of the seats. */
export async function measureStatement(url: string, seats: readonly Seat[], connections: number, seconds = 5): Promise<number> {
  const folder = await fs.mkdtemp(path.join(os.tmpdir(), 'fullfield-bench-'));
  try {
    const files: string[] = [];
    for (const [place, seat] of seats.entries()) {
      const file = path.join(folder, `${place}.sql`);
      await fs.writeFile(file, await scriptFor(seat));
      files.push(file);
    }
    const args = ['-n', '-M', 'prepared', '-c', String(connections), '-j', '2', '-T', String(seconds), ...files.flatMap((file) => ['-f', file]), url];
    const env = { ...process.env, PGOPTIONS: '-c role=fullfield_candidate' };
    const said = await new Promise<string>((resolve, reject) =>
      execFile(path.join(findBinaries() ?? '', 'pgbench'), args, { env }, (error, out, err) => (error ? reject(new Error(`pgbench: ${err}`)) : resolve(out))),
    );
    const rate = Number(/tps = ([\d.]+)/.exec(said)?.[1]);
    if (!(rate > 0)) throw new Error(`pgbench gave no rate:\n${said}`);
    return rate;
  } finally {
    await fs.rm(folder, { recursive: true, force: true });
  }
}
