import { readFileSync } from 'node:fs';

/** Linux counts processor time in hundredths of a second for programs to read, whatever its own clock does. */
const tick = 10;

/**
 * Processor time that a process has used [ms], or null where the system does not tell. On a busy machine a task that is
 * starved looks like one that never ends; this tells them apart.
 */
export function processorTime(pid: number | undefined): number | null {
  if (pid === undefined) return null;
  try {
    const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
    const fields = stat.slice(stat.lastIndexOf(')') + 2).split(' ');
    const used = Number(fields[11]) + Number(fields[12]);
    return Number.isFinite(used) ? used * tick : null;
  } catch {
    return null;
  }
}
