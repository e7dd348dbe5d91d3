import { startCluster } from '@/db/cluster';
import { loadDemoInto } from './demo';
import { dataDirectory } from './embedded';
import { whoRuns } from './running';
import { readSecrets } from './secrets';

/** `npm run demo:reset`: the demo as at the first start. Everything done in it since is gone. */
async function main(): Promise<number> {
  if (process.env.DATABASE_URL) {
    process.stderr.write('The demo lives in the embedded database only; DATABASE_URL names another one. Nothing was changed.\n');
    return 1;
  }
  const dataDir = dataDirectory();
  const running = await whoRuns(dataDir);
  if (running) {
    process.stderr.write(`Fullfield is running at ${running.address}. Stop it first (Ctrl-C in its window).\n`);
    return 1;
  }
  const say = (line: string) => process.stdout.write(`${line}\n`);
  const cluster = await startCluster({ dataDir, say });
  try {
    const port = process.env.PORT || '3000';
    Object.assign(process.env, await readSecrets(dataDir), { PUBLIC_URL: process.env.PUBLIC_URL || `http://127.0.0.1:${port}`, FULLFIELD_KIND: 'demo', DATA_DIR: dataDir });
    await loadDemoInto(cluster.url, say);
    say('The demo is as new. Start with: npm start');
    return 0;
  } finally {
    if (cluster.started) await cluster.stop();
  }
}

process.exitCode = await main();
