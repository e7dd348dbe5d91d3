import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { openDatabase } from '@/db/client';
import { type Cluster, startCluster } from '@/db/cluster';
import type { InstallationKind } from '@/lib/config';
import { keepIn, startSink } from '@/lib/mail/sink';
import { build, buildIsCurrent } from './build';
import { refusals, type StartSettings, warnings } from './checks';
import { isEmpty, loadDemoInto } from './demo';
import { installationKind, processEnvironment, type Settings } from './environment';
import { prepareDatabase } from './prepare';
import { keepRunning } from './processes';
import { readSecrets } from './secrets';
import { watchCluster } from './watch';

export type Mode = 'production' | 'development';
export type Plan = { mode: Mode; dataDir: string; host: string; port: number; distDir: string };
/** Something to stop, in the reverse of the order in which it was started. */
export type Ending = () => Promise<void>;

const say = (line: string): void => void process.stdout.write(`${line}\n`);

type Store = { url: string; embedded: boolean; kind: InstallationKind; /** Nobody is in it and the demo is to be loaded. */ firstRun: boolean };

/** The database: the one of DATABASE_URL, or ours. Migrated. */
async function openStore(plan: Plan, endings: Ending[]): Promise<Store> {
  const given = process.env.DATABASE_URL;
  if (given) {
    await prepareDatabase(given);
    return { url: given, embedded: false, kind: await installationKind(given), firstRun: false };
  }
  const cluster: Cluster = await startCluster({ dataDir: plan.dataDir, say });
  endings.push(() => cluster.stop());
  const applied = await prepareDatabase(cluster.url);
  if (applied.length > 0) say(`Database brought up to ${applied.at(-1)}`);
  endings.push(watchCluster(cluster, plan.dataDir, say));
  const firstRun = await isEmpty(cluster.url);
  return { url: cluster.url, embedded: true, kind: firstRun ? 'demo' : await installationKind(cluster.url), firstRun };
}

async function loadDemoAtFirst(store: Store, settings: object): Promise<void> {
  if (!store.firstRun) return;
  Object.assign(process.env, settings);
  await loadDemoInto(store.url, (line) => say(`Demo: ${line.trim()}`));
}

async function openSink(url: string, endings: Ending[]): Promise<string> {
  const db = openDatabase(url, 'fullfield_app', { max: 2, name: 'fullfield mail sink' });
  const sink = await startSink({ port: 0, keep: keepIn(db) });
  endings.push(async () => {
    await sink.close();
    await db.destroy();
  });
  return sink.url;
}

async function waitUntilServed(address: string, stopped: () => boolean): Promise<void> {
  for (let tries = 0; tries < 1_200 && !stopped(); tries += 1) {
    const answer = await fetch(`${address}/api/health`).catch(() => undefined);
    if (answer?.ok) return;
    await sleep(100);
  }
  if (!stopped()) throw new Error('The server did not answer within two minutes; see the logs.');
}

async function startProcesses(plan: Plan, settings: Settings, endings: Ending[], giveUp: () => void): Promise<void> {
  const env = processEnvironment(settings, plan.mode);
  const logs = path.join(plan.dataDir, 'logs');
  const production = plan.mode === 'production';
  const worker = await keepRunning(
    { name: 'The worker', args: ['--import', 'tsx', 'lib/jobs/worker.ts'], env: { ...env, NODE_ENV: 'production' }, log: path.join(logs, 'worker.log') },
    say,
    giveUp,
  );
  endings.push(() => worker.stop(9_000));
  const next = ['node_modules/next/dist/bin/next', production ? 'start' : 'dev', '-H', plan.host, '-p', String(plan.port)];
  const server = await keepRunning(
    { name: 'The server', args: next, env: { ...env, NEXT_DIST_DIR: plan.distDir }, log: production ? path.join(logs, 'server.log') : undefined },
    say,
    giveUp,
  );
  endings.push(() => server.stop());
}

async function buildWhenChanged(plan: Plan): Promise<void> {
  if (plan.mode !== 'production' || (await buildIsCurrent(plan.distDir))) return;
  say('Building; about a minute');
  await build(plan.distDir, path.join(plan.dataDir, 'logs', 'build.log'));
}

/**
 * Starts everything of an installation: database, mail sink, worker, server. Pushes to `endings` as it goes, so that what was
 * started can be stopped whatever happens. Resolves when the server answers.
 */
export async function serve(plan: Plan, endings: Ending[], stopped: () => boolean, giveUp: () => void): Promise<StartSettings> {
  const publicUrl = (process.env.PUBLIC_URL || `http://${plan.host === '0.0.0.0' ? '127.0.0.1' : plan.host}:${plan.port}`).replace(/\/+$/, '');
  const secrets = await readSecrets(plan.dataDir);
  const store = await openStore(plan, endings);
  const { kind } = store;
  const smtpUrl = process.env.SMTP_URL || undefined;
  const settings = { embedded: store.embedded, kind, databaseUrl: store.url, host: plan.host, publicUrl, smtpUrl, ...secrets };
  const why = refusals(settings);
  if (why.length > 0) throw new Error(`Not started:\n  ${why.join('\n  ')}`);
  for (const line of warnings(settings)) say(line);
  const forDemo = { ...secrets, PUBLIC_URL: publicUrl, FULLFIELD_KIND: kind, DATA_DIR: plan.dataDir };
  await Promise.all([loadDemoAtFirst(store, forDemo), buildWhenChanged(plan)]);
  const sinkUrl = smtpUrl ?? (kind === 'school' ? undefined : await openSink(store.url, endings));
  if (!stopped()) await startProcesses(plan, { ...settings, smtpUrl: sinkUrl, dataDir: plan.dataDir }, endings, giveUp);
  await waitUntilServed(`http://${plan.host === '0.0.0.0' ? '127.0.0.1' : plan.host}:${plan.port}`, stopped);
  return settings;
}
