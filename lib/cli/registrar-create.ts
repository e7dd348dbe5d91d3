import { createInterface } from 'node:readline/promises';
import { parseArgs } from 'node:util';
import { openDatabase } from '@/db/client';
import { createRegistrar } from '@/lib/people/commands';
import { dataDirectory, withDatabase } from './embedded';
import { prepareDatabase } from './prepare';
import { readSecrets } from './secrets';

const usage = 'npm run registrar:create -- --name "Ann Lee" --email ann@school.example\n';

/** What the flags leave out is asked for, when somebody is there to ask. */
async function particulars(): Promise<{ name: string; email: string }> {
  const { values } = parseArgs({ options: { name: { type: 'string' }, email: { type: 'string' } } });
  if (values.name && values.email) return { name: values.name, email: values.email };
  if (!process.stdin.isTTY) throw new Error(`Name and address are needed:\n  ${usage}`);
  const ask = createInterface({ input: process.stdin, output: process.stdout });
  try {
    const name = values.name ?? (await ask.question('Name of the registrar: '));
    const email = values.email ?? (await ask.question('E-mail address: '));
    return { name, email };
  } finally {
    ask.close();
  }
}

/** `npm run registrar:create`: the first account of an installation; prints the link by which its password is set. */
async function main(): Promise<number> {
  const input = await particulars();
  const dataDir = dataDirectory();
  const publicUrl = process.env.PUBLIC_URL || `http://127.0.0.1:${process.env.PORT || '3000'}`;
  return withDatabase(async (url) => {
    await prepareDatabase(url);
    Object.assign(process.env, await readSecrets(dataDir), { DATABASE_URL: url, PUBLIC_URL: publicUrl, DATA_DIR: dataDir });
    const db = openDatabase(url, 'fullfield_app', { max: 2 });
    try {
      const made = await createRegistrar(db, input);
      if (!made.ok) {
        process.stderr.write(`${made.says}\n`);
        return 1;
      }
      process.stdout.write(`The account is made. Its password is set at this address, which works once, until ${made.value.expiresAt.toISOString()}:\n${made.value.address}\n`);
      return 0;
    } finally {
      await db.destroy();
    }
  });
}

try {
  process.exitCode = await main();
} catch (error) {
  process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
  process.exitCode = 1;
}
