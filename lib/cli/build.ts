import { spawn } from 'node:child_process';
import { createHash } from 'node:crypto';
import { createWriteStream, promises as fs } from 'node:fs';
import path from 'node:path';
import { root } from './embedded';

const sources = ['app', 'components', 'db', 'fonts', 'lib', 'public'];
const files = ['instrumentation.ts', 'next.config.mjs', 'package-lock.json', 'postcss.config.mjs', 'proxy.ts', 'tailwind.config.ts', 'tsconfig.json'];

async function filesBelow(folder: string): Promise<string[]> {
  const entries = await fs.readdir(path.join(root, folder), { recursive: true, withFileTypes: true }).catch(() => []);
  return entries.filter((entry) => entry.isFile()).map((entry) => path.relative(root, path.join(entry.parentPath, entry.name)));
}

/** SHA-256 over every file that goes into a build: its name and its bytes. */
export async function sourcesDigest(): Promise<string> {
  const below = (await Promise.all(sources.map(filesBelow))).flat();
  const hash = createHash('sha256');
  for (const file of [...below, ...files].sort()) {
    const bytes = await fs.readFile(path.join(root, file)).catch(() => undefined);
    if (bytes) hash.update(`${file}\0${bytes.length}\0`).update(bytes);
  }
  return hash.digest('hex');
}

const stampOf = (distDir: string): string => path.join(root, distDir, 'sources.sha256');

/** Whether the build in `distDir` is of the sources as they are. */
export async function buildIsCurrent(distDir: string): Promise<boolean> {
  const stamp = await fs.readFile(stampOf(distDir), 'utf8').catch(() => '');
  return stamp !== '' && stamp === (await sourcesDigest());
}

/** Builds into `distDir`; everything it says goes to `log`. Throws with the end of the log when it fails. */
export async function build(distDir: string, log: string): Promise<void> {
  const digest = await sourcesDigest();
  await fs.mkdir(path.dirname(log), { recursive: true });
  await fs.rm(stampOf(distDir), { force: true });
  const code = await new Promise<number>((resolve, reject) => {
    const child = spawn(process.execPath, [path.join(root, 'node_modules/next/dist/bin/next'), 'build'], {
      cwd: root,
      env: { ...process.env, NODE_ENV: 'production', NEXT_DIST_DIR: distDir, NEXT_TELEMETRY_DISABLED: '1' },
      stdio: ['ignore', 'pipe', 'pipe'],
    });
    const out = createWriteStream(log);
    child.stdout.pipe(out);
    child.stderr.pipe(out, { end: false });
    child.on('error', reject);
    child.on('close', (status) => resolve(status ?? 1));
  });
  if (code !== 0) {
    const tail = (await fs.readFile(log, 'utf8')).trimEnd().split('\n').slice(-30).join('\n');
    throw new Error(`The build failed. The end of ${path.relative(root, log)}:\n${tail}`);
  }
  await fs.writeFile(stampOf(distDir), digest);
}
