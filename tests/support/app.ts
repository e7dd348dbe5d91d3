import { type ChildProcess, spawn } from 'node:child_process';
import { randomBytes } from 'node:crypto';
import { createWriteStream } from 'node:fs';
import { fileURLToPath } from 'node:url';
import { freePort } from '@/db/cluster';
import { processEnvironment } from '@/lib/cli/environment';
import { until } from './wait';

const root = fileURLToPath(new URL('../..', import.meta.url));

/** What the processes of one installation under test share. */
export type Installation = { databaseUrl: string; publicUrl: string; smtpUrl: string; dataDir: string; distDir: string; secrets: { NEXTAUTH_SECRET: string; SEAT_KEY: string } };

export const freshSecrets = (): Installation['secrets'] => ({
  NEXTAUTH_SECRET: randomBytes(36).toString('base64url'),
  SEAT_KEY: randomBytes(36).toString('base64url'),
});

export type Running = {
  pid: number;
  /** Sends a signal, SIGTERM by default, and waits until the process is gone. */
  end(signal?: NodeJS.Signals): Promise<void>;
};

function environment(installation: Installation): NodeJS.ProcessEnv {
  const { secrets, distDir, ...rest } = installation;
  return { ...processEnvironment({ ...rest, ...secrets, kind: 'test' }, 'production'), NEXT_DIST_DIR: distDir, FOLLOW_PARENT: '1' };
}

function launch(args: string[], env: NodeJS.ProcessEnv, log: string): Running {
  const child: ChildProcess = spawn(process.execPath, args, { cwd: root, env, stdio: ['ignore', 'pipe', 'pipe'] });
  const out = createWriteStream(log, { flags: 'a' });
  child.stdout?.pipe(out, { end: false });
  child.stderr?.pipe(out, { end: false });
  const gone = new Promise<void>((resolve) => child.once('exit', () => resolve()));
  return {
    pid: child.pid ?? 0,
    async end(signal = 'SIGTERM') {
      child.kill(signal);
      await gone;
    },
  };
}

/** A server process of the built application. Resolves when it answers. */
export async function startApp(installation: Installation, port?: number): Promise<Running & { url: string; port: number }> {
  const at = port ?? (await freePort());
  const args = ['node_modules/next/dist/bin/next', 'start', '-H', '127.0.0.1', '-p', String(at)];
  const running = launch(args, environment(installation), `${installation.dataDir}/app-${at}.log`);
  const url = `http://127.0.0.1:${at}`;
  await until(async () => (await fetch(`${url}/api/health`).catch(() => undefined))?.ok, 60);
  return { ...running, url, port: at };
}

/** A worker process. */
export const startWorkerProcess = (installation: Installation): Running =>
  launch(['--import', 'tsx', 'lib/jobs/worker.ts'], environment(installation), `${installation.dataDir}/worker.log`);
