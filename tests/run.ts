import { spawn } from 'node:child_process';
import { promises as fs } from 'node:fs';
import { typesAgree } from '@/db/codegen';
import { startTemporaryCluster } from '@/db/temporary';
import { root } from '@/lib/cli/embedded';
import { prepareDatabase } from '@/lib/cli/prepare';
import { ensureBuild, testData, testDist } from './support/browser.global';
import { type Counts, readPlaywright, readVitest } from './support/counts';

const say = (line: string): void => void process.stdout.write(`${line}\n`);
const children = new Set<number>();

/** Runs node with `args`. Shown as it goes, or only when it fails. */
function node(args: string[], options: { show: boolean; env?: Record<string, string> }): Promise<boolean> {
  return new Promise((resolve, reject) => {
    const env = { ...process.env, NEXT_TELEMETRY_DISABLED: '1', NEXT_DIST_DIR: testDist, ...options.env };
    const child = spawn(process.execPath, args, { cwd: root, env, stdio: ['ignore', options.show ? 'inherit' : 'pipe', options.show ? 'inherit' : 'pipe'] });
    const said: Buffer[] = [];
    child.stdout?.on('data', (piece: Buffer) => said.push(piece));
    child.stderr?.on('data', (piece: Buffer) => said.push(piece));
    if (child.pid) children.add(child.pid);
    child.on('error', reject);
    child.on('close', (code) => {
      if (child.pid) children.delete(child.pid);
      if (code !== 0 && !options.show) process.stdout.write(Buffer.concat(said));
      resolve(code === 0);
    });
  });
}

const one = (passed: boolean): Counts => (passed ? { passed: 1, failed: 0 } : { passed: 0, failed: 1 });

const lint = async () => one(await node(['node_modules/eslint/bin/eslint.js', '-c', 'tests/eslint.config.mjs', '.'], { show: false }));

async function types(): Promise<Counts> {
  const generated = await node(['node_modules/next/dist/bin/next', 'typegen'], { show: false });
  return one(generated && (await node(['node_modules/typescript/bin/tsc', '--noEmit', '-p', `${testDist}.tsconfig.json`], { show: false })));
}

async function drift(): Promise<Counts> {
  const { cluster, remove } = await startTemporaryCluster('drift');
  try {
    await prepareDatabase(cluster.url);
    const agree = await typesAgree(cluster.url);
    if (!agree) say('db/types.ts is not that of the migrations: npm run db:types writes it anew.');
    return one(agree);
  } finally {
    await remove();
  }
}

async function vitest(): Promise<Counts> {
  const file = `${testData}/vitest.json`;
  await fs.rm(file, { force: true });
  await node(['node_modules/vitest/vitest.mjs', 'run', '-c', 'tests/vitest.config.ts', '--reporter=default', '--reporter=json', `--outputFile=${file}`], { show: true });
  return readVitest(file);
}

async function build(): Promise<Counts> {
  try {
    await ensureBuild();
    return one(true);
  } catch (error) {
    say(error instanceof Error ? error.message : String(error));
    return one(false);
  }
}

async function browser(): Promise<Counts> {
  const file = `${testData}/playwright.json`;
  await fs.rm(file, { force: true });
  await node(['node_modules/@playwright/test/cli.js', 'test', '-c', 'tests/playwright.config.ts'], { show: true, env: { PLAYWRIGHT_REPORT: file } });
  return readPlaywright(file);
}

const steps: [string, () => Promise<Counts>][] = [
  ['Lint', lint],
  ['Types', types],
  ['Types of the database', drift],
  ['Tests of the parts and of the database', vitest],
  ['Build', build],
  ['Tests in the browser', browser],
];

/** `npm test`: every check of the repository, with a database, ports and folders of its own. */
async function main(): Promise<void> {
  await fs.mkdir(testData, { recursive: true });
  const total: Counts = { passed: 0, failed: 0 };
  for (const [place, [name, run]] of steps.entries()) {
    say(`\n[${place + 1}/${steps.length}] ${name}`);
    const began = performance.now();
    const { passed, failed } = await run();
    total.passed += passed;
    total.failed += failed;
    say(`[${place + 1}/${steps.length}] ${name}: ${passed} passed, ${failed} failed (${Math.round((performance.now() - began) / 1000)} s)`);
  }
  process.exitCode = total.failed === 0 && total.passed > 0 ? 0 : 1;
  say(`\n${total.passed} passed, ${total.failed} failed`);
}

for (const signal of ['SIGINT', 'SIGTERM'] as const) {
  process.on(signal, () => {
    for (const pid of children) process.kill(pid, signal);
    // Databases left behind are stopped and removed by the next run.
    process.exit(130);
  });
}
await main();
