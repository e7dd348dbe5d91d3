import { type ChildProcess, spawn } from 'node:child_process';
import { promises as fs } from 'node:fs';
import path from 'node:path';
import { clusterFolder, freePort } from '@/db/cluster';
import { root } from '@/lib/cli/embedded';

const patience = 300_000;

export type Served = { url: string; dataDir: string; seconds: number; stop(): Promise<void> };

/** The settings of a person's own shell: none of those that a run of ours has set. */
function plainEnvironment(more: Record<string, string>): NodeJS.ProcessEnv {
  const env: NodeJS.ProcessEnv = { ...process.env, ...more };
  for (const name of ['DATABASE_URL', 'SMTP_URL', 'PUBLIC_URL', 'FULLFIELD_KIND', 'NEXTAUTH_SECRET', 'SEAT_KEY', 'HOST']) delete env[name];
  return env;
}

function untilReady(child: ChildProcess, line: string): Promise<void> {
  return new Promise((resolve, reject) => {
    let said = '';
    const timer = setTimeout(() => reject(new Error(`It was not ready in time:\n${said}`)), patience);
    const hear = (piece: Buffer) => {
      said += piece.toString();
      if (said.includes(line)) resolve(clearTimeout(timer));
    };
    child.stdout?.on('data', hear);
    child.stderr?.on('data', hear);
    child.once('exit', (code) => reject(new Error(`It ended with ${code}:\n${said}`)));
  });
}

/** Runs `npm start` on `dataDir` until it says that it is ready; `seconds` is the time that took. */
export async function runStart(dataDir: string): Promise<Served> {
  const port = await freePort();
  const url = `http://127.0.0.1:${port}`;
  const began = performance.now();
  const child = spawn('npm', ['start'], { cwd: root, env: plainEnvironment({ PORT: String(port), DATA_DIR: dataDir }), stdio: ['ignore', 'pipe', 'pipe'], detached: true });
  // npm ends before what it started: all of it is gone when nobody holds its output any more.
  const gone = new Promise<void>((resolve) => child.once('close', () => resolve()));
  const stop = async () => {
    if (child.exitCode !== null) return;
    // To the whole group, as Ctrl-C in a window does: npm does not hand a signal of its own on.
    process.kill(-(child.pid ?? 0), 'SIGINT');
    await gone;
  };
  try {
    await untilReady(child, `Fullfield is ready at ${url}\n`);
  } catch (error) {
    await stop();
    throw error;
  }
  return { url, dataDir, seconds: (performance.now() - began) / 1000, stop };
}

/** A folder for the data of one measurement; `remove` takes PostgreSQL's files away too. */
export async function dataFolder(): Promise<{ dataDir: string; remove(): Promise<void> }> {
  const dataDir = await fs.mkdtemp(path.join('/var/tmp', 'fullfield-bench-'));
  await fs.chmod(dataDir, 0o755);
  const remove = async () => {
    await fs.rm(clusterFolder(dataDir).folder, { recursive: true, force: true });
    await fs.rm(dataDir, { recursive: true, force: true });
  };
  return { dataDir, remove };
}
