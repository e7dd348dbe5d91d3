import { type ChildProcess, spawn } from 'node:child_process';
import { openSync, promises as fs } from 'node:fs';
import path from 'node:path';
import { setTimeout as sleep } from 'node:timers/promises';
import { root } from './embedded';

export type ProcessPlan = {
  name: string;
  /** Arguments of node. */
  args: string[];
  env: NodeJS.ProcessEnv;
  /** File for what it says; without one it says it here. */
  log?: string;
};

export type Kept = {
  /** Stops it: asked first, killed when it does not go within `patience` milliseconds. */
  stop(patience?: number): Promise<void>;
};

const mostRestarts = 5;
const within = 60_000;

const kill = (child: ChildProcess, signal: NodeJS.Signals) => {
  // Its own process group, so that a Ctrl-C here does not reach it before its turn.
  try {
    if (child.pid !== undefined) process.kill(-child.pid, signal);
  } catch {
    // It is gone.
  }
};

function begin(plan: ProcessPlan): ChildProcess {
  const out = plan.log === undefined ? 'inherit' : openSync(plan.log, 'a');
  return spawn(process.execPath, plan.args, { cwd: root, env: { ...plan.env, FOLLOW_PARENT: '1' }, stdio: ['ignore', out, out], detached: true });
}

/**
 * Starts a process and starts it again when it ends by itself; five times within a minute is too often: then `giveUp` is called.
 */
export async function keepRunning(plan: ProcessPlan, tell: (line: string) => void, giveUp: () => void): Promise<Kept> {
  if (plan.log !== undefined) await fs.mkdir(path.dirname(plan.log), { recursive: true });
  const ends: number[] = [];
  let stopping = false;
  let child = begin(plan);
  const watch = () =>
    child.once('exit', (code, signal) => {
      if (stopping) return;
      ends.push(performance.now());
      const often = ends.filter((end) => end > performance.now() - within).length > mostRestarts;
      tell(`${plan.name} ended (${signal ?? code})${often ? ' too often' : '; starting it again'}${plan.log ? `; see ${plan.log}` : ''}`);
      if (often) return giveUp();
      setTimeout(() => {
        if (stopping) return;
        child = begin(plan);
        watch();
      }, 500);
    });
  watch();
  return {
    async stop(patience = 5_000) {
      stopping = true;
      const gone = new Promise<void>((resolve) => {
        if (child.exitCode !== null || child.signalCode !== null) resolve();
        else child.once('exit', () => resolve());
      });
      kill(child, 'SIGTERM');
      await Promise.race([gone, sleep(patience, undefined, { ref: false })]);
      kill(child, 'SIGKILL');
      await gone;
    },
  };
}
