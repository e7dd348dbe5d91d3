import { promises as fs } from 'node:fs';
import { type Cluster, type ClusterOptions, clusterFolder, startCluster } from './cluster';

const base = '/var/tmp';
const prefix = 'fullfield-temporary-';

export type TemporaryCluster = {
  cluster: Cluster;
  /** Stops the server and deletes its files. */
  remove(): Promise<void>;
};

function alive(pid: number): boolean {
  try {
    process.kill(pid, 0);
    return true;
  } catch (error) {
    return (error as NodeJS.ErrnoException).code === 'EPERM';
  }
}

async function removeCluster(cluster: Cluster, dataDir: string): Promise<void> {
  await cluster.stop();
  await fs.rm(clusterFolder(dataDir).folder, { recursive: true, force: true });
  await fs.rm(dataDir, { recursive: true, force: true });
}

/** Stops and removes what earlier processes left behind that were killed before they could tidy up. */
async function sweep(): Promise<void> {
  const names = (await fs.readdir(base)).filter((name) => name.startsWith(prefix));
  for (const name of names) {
    const pid = Number(name.slice(prefix.length).split('-')[0]);
    if (!Number.isInteger(pid) || alive(pid)) continue;
    const dataDir = `${base}/${name}`;
    await startCluster({ dataDir }).then((cluster) => removeCluster(cluster, dataDir)).catch(() => undefined);
  }
}

/** A PostgreSQL for this process alone, beside any other: for tests and for reading the schema. `label` tells several apart. */
export async function startTemporaryCluster(label: string, options: Omit<ClusterOptions, 'dataDir'> = {}): Promise<TemporaryCluster> {
  await sweep();
  const dataDir = `${base}/${prefix}${process.pid}-${label}`;
  const cluster = await startCluster({ ...options, dataDir });
  return { cluster, remove: () => removeCluster(cluster, dataDir) };
}
