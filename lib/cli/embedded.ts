import path from 'node:path';
import { fileURLToPath } from 'node:url';
import { startCluster } from '@/db/cluster';

/** Folder of the repository. */
export const root = fileURLToPath(new URL('../..', import.meta.url)).replace(/\/$/, '');

/** Where an installation keeps its data: `DATA_DIR`, or the ignored folder `.data`. */
export const dataDirectory = (): string => path.resolve(root, process.env.DATA_DIR || '.data');

/**
 * Runs `work` with the owner's address of the installation's database: `DATABASE_URL`, or the embedded PostgreSQL,
 * which is started for the time of the work when it does not run already.
 */
export async function withDatabase<Value>(work: (url: string, embedded: boolean) => Promise<Value>): Promise<Value> {
  if (process.env.DATABASE_URL) return work(process.env.DATABASE_URL, false);
  const cluster = await startCluster({ dataDir: dataDirectory(), say: (line) => process.stdout.write(`${line}\n`) });
  try {
    return await work(cluster.url, true);
  } finally {
    if (cluster.started) await cluster.stop();
  }
}
