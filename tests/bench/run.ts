import { promises as fs } from 'node:fs';
import path from 'node:path';
import { startTemporaryCluster } from '@/db/temporary';
import { build, buildIsCurrent } from '@/lib/cli/build';
import { dataDirectory } from '@/lib/cli/embedded';
import { freshSecrets } from '../support/app';
import { measureDraw } from './draw';
import { measureRoomScripts, type ScriptMeasure } from './room-scripts';
import { measureSaves, type SaveMeasure } from './saves';
import { dataFolder, runStart } from './start';

/** A figure with the limit it has to keep. */
type Line = { name: string; value: number; unit: string; limit: string; met: boolean };

const limits = { drawTime: 2, saveShare: 0.45, scripts: 190, start: 10 };
const distDir = process.env.NEXT_DIST_DIR || '.next';
const json = process.argv.includes('--json');
const tell = (line: string): void => void process.stderr.write(`${line}\n`);

async function saves(): Promise<SaveMeasure> {
  const { cluster, remove } = await startTemporaryCluster('bench');
  const { dataDir, remove: removeData } = await dataFolder();
  try {
    return await measureSaves({ databaseUrl: cluster.url, publicUrl: 'http://127.0.0.1', smtpUrl: '', dataDir, distDir, secrets: freshSecrets() });
  } finally {
    await remove();
    await removeData();
  }
}

/** Start of an installation that is built and has its data: the middle of three. */
async function startAndScripts(): Promise<{ seconds: number[]; scripts: ScriptMeasure }> {
  const { dataDir, remove } = await dataFolder();
  try {
    const first = await runStart(dataDir);
    const scripts = await measureRoomScripts(first).finally(() => first.stop());
    const seconds: number[] = [];
    for (let turn = 0; turn < 3; turn += 1) {
      const served = await runStart(dataDir);
      seconds.push(served.seconds);
      await served.stop();
    }
    return { seconds: seconds.sort((a, b) => a - b), scripts };
  } finally {
    await remove();
  }
}

function table(lines: readonly Line[], beside: readonly string[]): void {
  const row = (name: string, value: string, limit: string, met: string) => process.stdout.write(`${name.padEnd(54)}${value.padStart(16)}  ${limit.padEnd(14)}${met}\n`);
  row('', 'measured', 'limit', '');
  for (const { name, value, unit, limit, met } of lines) row(name, `${value.toFixed(2)} ${unit}`.trim(), limit, met ? 'met' : 'not met');
  process.stdout.write(`\n${beside.join('\n')}\n`);
}

/** `npm run bench`: a table, or JSON with `--json`. The exit status is 1 when a limit is not met. */
async function main(): Promise<void> {
  if (!(await buildIsCurrent(distDir))) {
    tell('Building');
    await build(distDir, path.join(dataDirectory(), 'logs', 'build.log'));
  }
  tell('Draws and keys');
  const draw = measureDraw();
  tell('Saves; half a minute or more');
  const save = await saves();
  tell(`${save.saves.toFixed(0)} saves a second, ${save.bare.toFixed(0)} bare requests`);
  tell('Starts, and the exam room in a browser; the first start loads the demo');
  const { seconds, scripts } = await startAndScripts();
  const start = seconds[1] ?? NaN;
  const lines: Line[] = [
    { name: 'Time of draw and key, over that of a plain function', value: draw.ratio, unit: '', limit: `at most ${limits.drawTime}`, met: draw.ratio <= limits.drawTime },
    { name: 'Durable saves a second, over a bare handler', value: save.ratio, unit: '', limit: `at least ${limits.saveShare}`, met: save.ratio >= limits.saveShare },
    { name: 'JavaScript of the exam room at first load, gzip', value: scripts.gzip / 1000, unit: 'kB', limit: `at most ${limits.scripts} kB`, met: scripts.gzip / 1000 <= limits.scripts },
    { name: 'Start of a built npm start', value: start, unit: 's', limit: `at most ${limits.start} s`, met: start <= limits.start },
  ];
  if (json) process.stdout.write(`${JSON.stringify({ lines, draw, save, scripts, starts: seconds }, null, 2)}\n`);
  else {
    table(lines, [
      `Draws with keys a second: ${draw.engine.toFixed(0)} by the engine, ${draw.plain.toFixed(0)} by the plain function`,
      `Requests a second over 10 connections: ${save.saves.toFixed(0)} durable saves, ${save.bare.toFixed(0)} bare; the save's statement alone by pgbench: ${save.statement.toFixed(0)}`,
      `Time of the processor in the server process a request: ${save.work.save.toFixed(2)} ms for a save, ${save.work.bare.toFixed(2)} ms bare`,
      `Exam room: ${scripts.files} scripts, ${(scripts.bytes / 1000).toFixed(0)} kB before gzip`,
      `Starts: ${seconds.map((one) => one.toFixed(1)).join(', ')} s`,
    ]);
  }
  process.exitCode = lines.every((line) => line.met) ? 0 : 1;
}

await fs.mkdir(dataDirectory(), { recursive: true });
await main();
