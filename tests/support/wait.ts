import { setTimeout as sleep } from 'node:timers/promises';

/** Asks again until `ask` gives something (not undefined, null or false); throws after `seconds`. */
export async function until<Value>(ask: () => Promise<Value | undefined | null | false>, seconds = 20): Promise<Value> {
  const end = performance.now() + seconds * 1000;
  for (;;) {
    const value = await ask();
    if (value !== undefined && value !== null && value !== false) return value;
    if (performance.now() > end) throw new Error(`Waited ${seconds} s in vain for: ${ask.toString()}`);
    await sleep(50);
  }
}
