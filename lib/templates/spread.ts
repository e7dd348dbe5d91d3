import type { DrawnPart } from './kinds/kind';
import { Tally } from './kinds/tally';
import type { Problem } from './problem';
import { magnitude } from './tolerance';

/** Distinct tuples of keys that a check wants among 2,000 draws. */
const wanted = 100;
/** Share of pairs of candidates who may get the same keys. */
const mostCopied = 0.05;

/** Gathers the keys of a check's draws: how many different papers there are, and how the keys lie. */
export class Spread {
  private readonly tuples = new Map<string, Tally>();
  private readonly numbers: Map<string, number[]>;
  constructor(parts: readonly string[]) {
    this.numbers = new Map(parts.map((part) => [part, []]));
  }

  add(seed: string, parts: readonly DrawnPart[]): void {
    const tuple = JSON.stringify(parts.map(({ key }) => key.text));
    const tally = this.tuples.get(tuple) ?? new Tally();
    this.tuples.set(tuple, tally);
    tally.add(seed);
    for (const { part, carries } of parts) if (carries !== undefined && Number.isFinite(magnitude(carries))) this.numbers.get(part)?.push(typeof carries === 'number' ? carries : magnitude(carries));
  }

  get distinct(): number {
    return this.tuples.size;
  }
  /** Keys of each part that has numbers for keys. */
  get values(): [string, number[]][] {
    return [...this.numbers].filter(([, values]) => values.length > 0);
  }
  get commonest(): Tally {
    return [...this.tuples.values()].reduce((most, tally) => (tally.count > most.count ? tally : most), new Tally());
  }
  /** Share of the pairs of draws whose keys are all printed alike. */
  get copied(): number {
    const counts = [...this.tuples.values()].map(({ count }) => count);
    const total = counts.reduce((sum, count) => sum + count, 0);
    return total < 2 ? 0 : counts.reduce((sum, count) => sum + count * (count - 1), 0) / (total * (total - 1));
  }
}

/** Tuples that a template with just enough of them shows in so many draws: in 2,000 all hundred, in fewer not all. */
const enough = (draws: number): number => Math.floor(wanted * (1 - (1 - 1 / wanted) ** draws) * (draws < 2000 ? 0.9 : 1));

export function problemsOfSpread(spread: Spread, draws: number): Problem[] {
  if (spread.distinct === 0) return [];
  const problems: Problem[] = [];
  if (spread.distinct < enough(draws))
    problems.push({ code: 'few-distinct', count: spread.distinct, share: spread.distinct / draws, seeds: [], says: `The ${draws} draws give only ${spread.distinct} different sets of keys: widen the givens.` });
  if (spread.copied > mostCopied) {
    const { count, seeds } = spread.commonest;
    problems.push({ code: 'copied', count, share: spread.copied, seeds, says: `Two candidates get the same keys in ${(spread.copied * 100).toFixed(1)} % of pairs: widen the givens.` });
  }
  return problems;
}
