import { sha256 } from '@noble/hashes/sha2';
import { bytesToHex, utf8ToBytes } from '@noble/hashes/utils';
import alea from 'seedrandom/lib/alea.js';

/** A stream of numbers in [0, 1). */
export type Stream = () => number;

/**
 * The stream of one given: SHA-256 (hex) of JSON.stringify([1, seed, name, redraw]) seeds the generator alea, so that no
 * given's draws depend on another's. `redraw` counts from 0.
 */
export function streamOf(seed: string, name: string, redraw: number): Stream {
  return alea(bytesToHex(sha256(utf8ToBytes(JSON.stringify([1, seed, name, redraw])))));
}

/** The next of `count` equally likely places, 0 to count - 1. */
export const nextIndex = (stream: Stream, count: number): number => Math.floor(stream() * count);

/** A shuffled copy (Fisher and Yates, from the end), drawn from the stream. */
export function shuffle<Item>(items: readonly Item[], stream: Stream): Item[] {
  const shuffled = [...items];
  for (let i = shuffled.length - 1; i > 0; i -= 1) {
    const j = nextIndex(stream, i + 1);
    [shuffled[i], shuffled[j]] = [shuffled[j] as Item, shuffled[i] as Item];
  }
  return shuffled;
}
