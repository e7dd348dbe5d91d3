import { createHmac } from 'node:crypto';
import type { Draw } from '@/lib/templates/draw';

/**
 * Seed of a candidate's question: HMAC-SHA256 [hex] of "candidate:place" under the sitting's secret, so that nobody can compute
 * a neighbour's. `attempt` counts draws given up because they were not new; from the second on it stands behind the seed.
 */
export function seedOf(secret: Uint8Array, candidateId: string, question: number, attempt = 0): string {
  const seed = createHmac('sha256', secret).update(`${candidateId}:${question}`).digest('hex');
  return attempt === 0 ? seed : `${seed}~${attempt}`;
}

/** The keys of a draw as printed: two draws with the same ones ask for the same answers. */
export const keysOf = (draw: Draw): string => JSON.stringify(draw.parts.map((part) => [part.part, part.key.text]));
/** The givens of a draw as printed. */
export const givensOf = (draw: Draw): string => JSON.stringify(Object.entries(draw.given).map(([name, given]) => [name, given.text]).sort());

/** What a new draw is compared with. */
export type Seen = {
  /** Keys and givens this student was ever given of the same template. */
  keys: ReadonlySet<string>;
  givens: ReadonlySet<string>;
  /** Keys of the same question in other papers of the sitting. */
  neighbours: ReadonlySet<string>;
};

const attempts = 40;

/** How much a draw repeats: 0 nothing, 1 a neighbour's keys, 2 keys the student had, 3 keys and givens the student had. */
function repeats(draw: Draw, seen: Seen): 0 | 1 | 2 | 3 {
  if (seen.keys.has(keysOf(draw))) return seen.givens.has(givensOf(draw)) ? 3 : 2;
  return seen.neighbours.has(keysOf(draw)) ? 1 : 0;
}

/**
 * The first draw that is new to the student and differs from every neighbour's. A template with few values may have none:
 * then the one that repeats least, and `repeats` says how much.
 */
export function newestDraw(drawAt: (attempt: number) => Draw, seen: Seen): { draw: Draw; repeats: 0 | 1 | 2 | 3 } {
  let best: { draw: Draw; repeats: 0 | 1 | 2 | 3 } | null = null;
  for (let attempt = 0; attempt < attempts; attempt += 1) {
    const draw = drawAt(attempt);
    const found = { draw, repeats: repeats(draw, seen) };
    if (best === null || found.repeats < best.repeats) best = found;
    if (best.repeats === 0) break;
  }
  if (best === null) throw new Error('A question was drawn no time.');
  return best;
}
