import { spawn } from 'node:child_process';
import { mkdtemp, readFile, rm } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import { fileURLToPath } from 'node:url';

const root = fileURLToPath(new URL('..', import.meta.url));
const typesFile = path.join(root, 'db', 'types.ts');

function generate(url: string, file: string): Promise<void> {
  const args = [
    path.join(root, 'node_modules/kysely-codegen/dist/cli/bin.js'),
    ...['--dialect', 'postgres', '--url', url, '--out-file', file],
    ...['--default-schema', 'public', '--include-pattern', 'public.*', '--exclude-pattern', 'public.*migration*'],
    ...['--date-parser', 'string', '--numeric-parser', 'number', '--type-mapping', '{"int8":"number"}'],
  ];
  return new Promise((resolve, reject) => {
    const child = spawn(process.execPath, args, { cwd: root, stdio: ['ignore', 'ignore', 'inherit'] });
    child.on('error', reject);
    child.on('exit', (code) => (code === 0 ? resolve() : reject(new Error(`kysely-codegen ended with ${code}.`))));
  });
}

/** Writes `db/types.ts` from the schema at `url` (the owner's address). */
export const writeTypes = (url: string): Promise<void> => generate(url, typesFile);

/** Whether `db/types.ts` is what the schema at `url` gives. The tool's own comparison forgets how numbers are read, hence ours. */
export async function typesAgree(url: string): Promise<boolean> {
  const folder = await mkdtemp(path.join(os.tmpdir(), 'fullfield-codegen-'));
  try {
    const file = path.join(folder, 'types.ts');
    await generate(url, file);
    return (await readFile(file, 'utf8')) === (await readFile(typesFile, 'utf8'));
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}
