import { type ChildProcess, spawn } from 'node:child_process';
import { setPriority } from 'node:os';
import path from 'node:path';
import { done, refuse, type Result } from '@/lib/result';
import { processorTime } from './cpu-time';
import type { Answers, Task } from './sandbox-tasks';

// Text that somebody is typing may hold a formula that never ends. It is read and drawn in a process of its own, which
// can be killed, has a memory limit and knows no secret; it stays warm for the next request.
const mostAtOnce = 2;
const heapMegabytes = 256;
const startMilliseconds = 120_000;
/** How many times its limit of processor time a task may wait for a processor. */
const mostWaiting = 12;

export type Limits = {
  /** Processor time without a sign of life after which the task is stopped [ms]. */
  stall: number;
  onProgress?: (done: number) => void;
  signal?: AbortSignal;
};
export type SandboxRefusal = 'stopped' | 'cancelled' | 'broken';

type Message = { kind: 'ready' } | { kind: 'progress'; done: number } | { kind: 'answer'; value: unknown } | { kind: 'error'; says: string };
type Pool = { idle: ChildProcess[]; running: number; waiting: (() => void)[] };
const shared = globalThis as typeof globalThis & { fullfieldSandbox?: Pool };
const pool = (): Pool => (shared.fullfieldSandbox ??= { idle: [], running: 0, waiting: [] });

function start(): ChildProcess {
  const entry = path.join(/* turbopackIgnore: true */ process.cwd(), 'lib', 'bank', 'sandbox-process.ts');
  const args = [`--max-old-space-size=${heapMegabytes}`, '--import', 'tsx', entry];
  const environment = { PATH: process.env.PATH, NODE_ENV: process.env.NODE_ENV } as NodeJS.ProcessEnv;
  const child = spawn(process.execPath, args, { cwd: process.cwd(), env: environment, stdio: ['ignore', 'ignore', 'inherit', 'ipc'] });
  child.on('error', () => undefined);
  child.once('exit', () => (pool().idle = pool().idle.filter((other) => other !== child)));
  return child;
}

/** Once started it gives way to everything else: a sitting that runs comes first. */
function yieldToOthers(child: ChildProcess): void {
  try {
    if (child.pid) setPriority(child.pid, 10);
  } catch {
    // It has ended already; the task will say so.
  }
}

const tooLong = (milliseconds: number): string => `Stopped after ${Math.round(milliseconds / 1_000)} s without an end: make the expressions, ranges or requirements simpler.`;

async function takePlace(): Promise<void> {
  const { running } = pool();
  if (running >= mostAtOnce) await new Promise<void>((resolve) => pool().waiting.push(resolve));
  else pool().running += 1;
}

function leavePlace(): void {
  const next = pool().waiting.shift();
  if (next) next();
  else pool().running -= 1;
}

/** An idle process must not keep its parent alive; a busy one must. */
function hold(child: ChildProcess, held: boolean): void {
  const channel = child.channel as unknown as { ref(): void; unref(): void } | null | undefined;
  if (held) child.ref();
  else child.unref();
  if (held) channel?.ref();
  else channel?.unref();
}

function converse<Kind extends Task['kind']>(child: ChildProcess, task: Extract<Task, { kind: Kind }>, fresh: boolean, limits: Limits): Promise<Result<Answers[Kind], SandboxRefusal>> {
  return new Promise((resolve) => {
    let timer: NodeJS.Timeout | undefined;
    const finish = (result: Result<Answers[Kind], SandboxRefusal>, keep: boolean) => {
      clearTimeout(timer);
      limits.signal?.removeEventListener('abort', abort);
      child.off('message', read).off('exit', ended);
      if (keep) {
        hold(child, false);
        pool().idle.push(child);
      } else child.kill('SIGKILL');
      resolve(result);
    };
    const wait = (milliseconds: number, says = tooLong(milliseconds)) => {
      clearTimeout(timer);
      const used = processorTime(child.pid);
      const last = performance.now() + milliseconds * mostWaiting;
      const look = () => {
        const now = processorTime(child.pid);
        // Starved by a busy machine, not running away: it may go on for a while.
        if (used !== null && now !== null && now - used < milliseconds && performance.now() < last) timer = setTimeout(look, 1_000);
        else finish(refuse('stopped', says), false);
      };
      timer = setTimeout(look, milliseconds);
    };
    const abort = () => finish(refuse('cancelled', 'Cancelled.'), false);
    const ended = () => finish(refuse('broken', 'The reading process ended early, most likely for want of memory: make the text simpler.'), false);
    const read = (message: Message) => {
      if (message.kind === 'ready') {
        if (fresh) yieldToOthers(child);
        wait(limits.stall);
      } else if (message.kind === 'progress') {
        wait(limits.stall);
        limits.onProgress?.(message.done);
      } else if (message.kind === 'answer') finish(done(message.value as Answers[Kind]), true);
      else finish(refuse('broken', message.says), false);
    };
    if (limits.signal?.aborted) return abort();
    limits.signal?.addEventListener('abort', abort);
    child.on('message', read).on('exit', ended);
    if (fresh) wait(startMilliseconds, 'The server is too busy to read the text now: try again in a moment.');
    else wait(limits.stall);
    child.send(task, (error) => error && ended());
  });
}

/**
 * Runs one task on text that nobody has proved yet, in a process that is killed when it shows no sign of life for
 * `limits.stall` [ms], when `limits.signal` aborts, or when it outgrows its memory. At most two run at once; others wait.
 */
export async function runSandboxed<Kind extends Task['kind']>(task: Extract<Task, { kind: Kind }>, limits: Limits): Promise<Result<Answers[Kind], SandboxRefusal>> {
  await takePlace();
  try {
    const warm = pool().idle.pop();
    const child = warm ?? start();
    hold(child, true);
    return await converse<Kind>(child, task, warm === undefined, limits);
  } finally {
    leavePlace();
  }
}

/** Ends the idle processes: for commands and tests that want to leave nothing behind. */
export function closeSandbox(): void {
  for (const child of pool().idle.splice(0)) child.kill('SIGKILL');
}
