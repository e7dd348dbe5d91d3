import { readFileSync } from 'node:fs';
import { promises as fs } from 'node:fs';
import path from 'node:path';

export type Running = { pid: number; born: string; address: string };

/** When a process began, in ticks since boot: with the number it names one process for ever, since numbers are used again. */
function bornAt(pid: number): string | undefined {
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    return stat.slice(stat.lastIndexOf(')') + 2).split(' ')[19];
  } catch {
    return undefined;
  }
}

const noteIn = (dataDir: string): string => path.join(dataDir, 'running.json');

/** Who runs on this data folder now; undefined when nobody does (also after a crash left its note). */
export async function whoRuns(dataDir: string): Promise<Running | undefined> {
  const text = await fs.readFile(noteIn(dataDir), 'utf8').catch(() => undefined);
  if (text === undefined) return undefined;
  try {
    const note = JSON.parse(text) as Running;
    return note.born !== undefined && bornAt(note.pid) === note.born ? note : undefined;
  } catch {
    return undefined;
  }
}

/**
 * Takes the data folder for this process. Returns who has it when it is taken, else the function that gives it back.
 */
export async function takeFolder(dataDir: string, address: string): Promise<Running | (() => Promise<void>)> {
  await fs.mkdir(dataDir, { recursive: true });
  const file = noteIn(dataDir);
  const mine: Running = { pid: process.pid, born: bornAt(process.pid) ?? '', address };
  for (;;) {
    try {
      await fs.writeFile(file, JSON.stringify(mine), { flag: 'wx', mode: 0o644 });
      return () => fs.rm(file, { force: true });
    } catch (error) {
      if ((error as NodeJS.ErrnoException).code !== 'EEXIST') throw error;
    }
    const other = await whoRuns(dataDir);
    if (other) return other;
    await fs.rm(file, { force: true });
  }
}
