import { promises as fs } from 'node:fs';
import { openDatabase } from '@/db/client';
import { startTemporaryCluster } from '@/db/temporary';
import { build, buildIsCurrent } from '@/lib/cli/build';
import { loadDemoInto } from '@/lib/cli/demo';
import { keepIn, startSink } from '@/lib/mail/sink';
import { freshSecrets, type Installation, startApp, startWorkerProcess } from './app';
import { freePort } from '@/db/cluster';
import { root } from '@/lib/cli/embedded';

export const testDist = '.next-test';
export const testData = `${root}/.data/test`;

type Ending = () => Promise<unknown>;

/** The built application; built now when its sources changed. */
export async function ensureBuild(): Promise<void> {
  if (!(await buildIsCurrent(testDist))) await build(testDist, `${testData}/build.log`);
}

async function startInstallation(endings: Ending[]): Promise<void> {
  const { cluster, remove } = await startTemporaryCluster('browser');
  endings.push(remove);
  const port = await freePort();
  const secrets = freshSecrets();
  const publicUrl = `http://127.0.0.1:${port}`;
  Object.assign(process.env, secrets, { PUBLIC_URL: publicUrl, FULLFIELD_KIND: 'demo', DATA_DIR: testData, DATABASE_URL: cluster.url });
  await loadDemoInto(cluster.url, () => undefined);
  const db = openDatabase(cluster.url, 'fullfield_app', { max: 2 });
  const sink = await startSink({ port: 0, keep: keepIn(db) });
  endings.push(async () => {
    await sink.close();
    await db.destroy();
  });
  const installation: Installation = { databaseUrl: cluster.url, publicUrl, smtpUrl: sink.url, dataDir: testData, distDir: testDist, secrets };
  const worker = startWorkerProcess(installation);
  endings.push(() => worker.end());
  const [first, second] = await Promise.all([startApp(installation, port), startApp(installation)]);
  endings.push(() => Promise.all([first.end(), second.end()]));
  // What tests find in their environment: two servers of one installation, its database and its settings.
  Object.assign(process.env, { FULLFIELD_URL: first.url, FULLFIELD_SECOND_URL: second.url, SMTP_URL: sink.url });
}

/** Starts one installation with the demo in it: database, mail sink, worker and two server processes. */
export default async function setup(): Promise<() => Promise<void>> {
  const endings: Ending[] = [];
  const tidy = async () => {
    for (const end of endings.reverse()) await end();
  };
  await fs.mkdir(testData, { recursive: true });
  try {
    await ensureBuild();
    await startInstallation(endings);
  } catch (error) {
    await tidy();
    throw error;
  }
  return tidy;
}
