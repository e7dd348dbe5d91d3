import net from 'node:net';
import path from 'node:path';
import { demoAccounts } from '@/lib/demo/accounts';
import type { StartSettings } from './checks';
import { dataDirectory, root } from './embedded';
import { takeFolder } from './running';
import { type Ending, type Mode, serve } from './serve';

const say = (line: string): void => void process.stdout.write(`${line}\n`);

function portFree(host: string, port: number): Promise<boolean> {
  return new Promise((resolve) => {
    const probe = net.createServer();
    probe.once('error', () => resolve(false));
    probe.listen(port, host, () => probe.close(() => resolve(true)));
  });
}

function readPort(): number {
  const port = Number(process.env.PORT || 3000);
  if (Number.isInteger(port) && port > 0 && port < 65_536) return port;
  throw new Error(`PORT must be a number from 1 to 65535, not "${process.env.PORT}".`);
}

async function stopAll(endings: Ending[]): Promise<void> {
  for (const end of endings.reverse()) await end().catch((error: unknown) => say(error instanceof Error ? error.message : String(error)));
}

/** The one block: where it is, who can sign in, where mail can be read, how to stop. */
function printBlock(settings: StartSettings, dataDir: string, local: string): void {
  const row = (label: string, text: string) => say(`  ${label.padEnd(24)}${text}`);
  say('');
  say('Fullfield');
  row('Address', settings.publicUrl);
  if (settings.kind === 'demo') {
    for (const account of demoAccounts) row(account.role, `${account.signIn}  password ${account.password}  (${account.name})`);
  }
  if (settings.kind !== 'school' && !settings.smtpUrl) row('Mail', `${settings.publicUrl}/mail`);
  row('Data', `${path.relative(root, dataDir) || '.'} (logs in logs/)`);
  row('Stop', 'Ctrl-C');
  say('');
  say(`Fullfield is ready at ${local}`);
}

/** Starts, says so, waits for a signal, stops all it started. The exit status is 1 when it could not start. */
export async function main(mode: Mode): Promise<void> {
  const endings: Ending[] = [];
  let stopping: Promise<never> | undefined;
  const end = (status: number): Promise<never> =>
    (stopping ??= (async () => {
      say('Stopping');
      await stopAll(endings);
      process.exit(status);
    })());
  process.on('SIGINT', () => void end(0));
  process.on('SIGTERM', () => void end(0));
  try {
    const port = readPort();
    const host = process.env.HOST || '127.0.0.1';
    const dataDir = dataDirectory();
    const local = `http://127.0.0.1:${port}`;
    const taken = await takeFolder(dataDir, local);
    if (typeof taken !== 'function') {
      say(`Fullfield is running already at ${taken.address} (process ${taken.pid}). Stop it with Ctrl-C there, or give this one another DATA_DIR and PORT.`);
      process.exit(1);
    }
    endings.push(taken);
    if (!(await portFree(host, port))) throw new Error(`Port ${port} is used by another program. Choose another: PORT=${port + 1} npm start`);
    const distDir = process.env.NEXT_DIST_DIR || '.next';
    const settings = await serve({ mode, dataDir, host, port, distDir }, endings, () => stopping !== undefined, () => void end(1));
    if (!stopping) printBlock(settings, dataDir, local);
  } catch (error) {
    if (!stopping) process.stderr.write(`${error instanceof Error ? error.message : String(error)}\n`);
    await end(1);
  }
}
