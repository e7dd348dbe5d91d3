import { setTimeout as sleep } from 'node:timers/promises';
import pg from 'pg';
import { type Cluster, startCluster } from '@/db/cluster';

async function answers(url: string): Promise<boolean> {
  const client = new pg.Client({ connectionString: url, connectionTimeoutMillis: 5_000 });
  client.on('error', () => undefined);
  try {
    await client.connect();
    await client.query('select 1');
    return true;
  } catch (error) {
    // Too many connections, or still replaying its log: it lives.
    return error instanceof pg.DatabaseError;
  } finally {
    await client.end().catch(() => undefined);
  }
}

/** Starts the embedded PostgreSQL again, on the same port, when it was killed. Returns the way to end watching. */
export function watchCluster(cluster: Cluster, dataDir: string, say: (line: string) => void): () => Promise<void> {
  const stopping = new AbortController();
  const loop = async () => {
    while (!stopping.signal.aborted) {
      await sleep(2_000, undefined, { signal: stopping.signal }).catch(() => undefined);
      if (stopping.signal.aborted || (await answers(cluster.url))) continue;
      say('PostgreSQL ended; starting it again');
      await startCluster({ dataDir, port: cluster.port }).catch((error: unknown) => say(error instanceof Error ? error.message : String(error)));
    }
  };
  const watching = loop();
  return async () => {
    stopping.abort();
    await watching;
  };
}
