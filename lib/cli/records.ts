import { openDatabase } from '@/db/client';
import { chainHead, verifyLog } from '@/lib/audit/queries';
import { verifyRows } from '@/lib/results/verify';
import { withDatabase } from './embedded';

const usage = `Use:
  npm run records -- verify [--json]
Exit status: 0 in order, 1 something was changed, 2 wrong use.`;

const print = (text: string): void => {
  process.stdout.write(`${text}\n`);
};

/** Recomputes the log, and compares marks, results and reports with it. */
async function verify(url: string, json: boolean): Promise<number> {
  const db = openDatabase(url, 'fullfield_app', { max: 2, name: 'fullfield records' });
  try {
    const [log, rows, head] = [await verifyLog(db), await verifyRows(db), await chainHead(db)];
    const faults = [...log, ...rows];
    if (json) print(JSON.stringify({ ok: faults.length === 0, head, log, rows }, null, 2));
    else {
      for (const fault of faults) print(fault.says);
      print(faults.length === 0 ? `The records are in order. Head of the log: ${head ? `block ${head.number}, ${head.digest}` : 'no block yet'}.` : `${faults.length} found.`);
    }
    return faults.length === 0 ? 0 : 1;
  } finally {
    await db.destroy();
  }
}

async function main(): Promise<number> {
  const [command, ...options] = process.argv.slice(2);
  if (command !== 'verify' || options.some((option) => option !== '--json')) {
    process.stderr.write(`${usage}\n`);
    return 2;
  }
  return withDatabase((url) => verify(url, options.includes('--json')));
}

process.exitCode = await main();
