import { roundToDecimals } from '@/lib/numeric/digits';
import type { ProblemCode } from '../problem';
import { angleBetween, type Amount, distance, isFiniteAmount, magnitude, matches } from '../tolerance';
import type { DrawnPart, Note, Rounded, Scope, Sight } from './kind';
import { defaultAllowance, evaluateAmount, isAbsurd, type Quantity, roundAmount } from './quantity';
import { Tally } from './tally';

type Finding = { code: ProblemCode; says: string; count: number; share: number; seeds: string[] };

const percent = (share: number): string => `${(share * 100).toLocaleString('en', { maximumFractionDigits: 1 })} %`;

/** The value below which the given share of sorted numbers lies. */
const quantile = (sorted: readonly number[], share: number): number => sorted[Math.min(sorted.length - 1, Math.max(0, Math.ceil(share * sorted.length) - 1))] ?? NaN;

/** The key as it is printed, which must be the key itself where only the exact value is right. */
const asPrinted = (key: Amount, { precision }: Quantity): Amount => {
  if (typeof key !== 'number') return key;
  return 'decimals' in precision ? roundToDecimals(key, precision.decimals) : roundAmount(key, precision.figures);
};

/**
 * Checks a quantity over many draws: is its key finite and sensible, does the tolerance leave honest rounding in and
 * known wrong ways out.
 */
export class QuantityExaminer {
  private draws = 0;
  private above = new Tally();
  private below = new Tally();
  private moved: { ratio: number; seed: string }[] = [];
  private readonly accepted: Tally[];
  private readonly crowded: Tally[];

  constructor(private readonly quantity: Quantity, private readonly figuresGiven: boolean) {
    this.accepted = quantity.missteps.map(() => new Tally());
    this.crowded = quantity.missteps.map(() => new Tally());
  }

  look({ seed, scope }: Sight, drawn: DrawnPart, key: Amount | null, rounded: Rounded, note: Note): void {
    this.draws += 1;
    if (key === null || !isFiniteAmount(key)) return note('not-finite', 'The key is infinite, not a number, or cannot be computed: narrow the givens or require what keeps it finite.');
    if (typeof key !== 'number' && !this.quantity.asked.complex)
      return note('not-finite', 'The key is a complex number where a real one was expected: take its magnitude with abs(), or state form: complex.');
    if (isAbsurd(key, this.quantity.limits)) note('absurd', `The key lies outside the limits ${this.quantity.limits.join(' to ')} ${this.quantity.unit.symbol}: narrow the givens.`);
    if (typeof key === 'number' && key > 0) this.above.add(seed);
    if (typeof key === 'number' && key < 0) this.below.add(seed);
    this.weighMissteps(seed, key, drawn);
    this.moved.push({ ratio: this.movement(scope, key, rounded), seed });
  }

  private weighMissteps(seed: string, key: Amount, drawn: DrawnPart): void {
    const allowance = defaultAllowance(this.quantity, key);
    drawn.missteps.forEach(({ value }, index) => {
      if (value === null) return;
      if (matches(value, key, allowance)) this.accepted[index]?.add(seed);
      if (this.quantity.asked.complex) return;
      if (allowance.tolerance > distance(value, key) / 2) this.crowded[index]?.add(seed);
    });
  }

  /** How far honest rounding moves the key, as a multiple of the tolerance: above 1 it is marked wrong. */
  private movement(scope: Scope, key: Amount, rounded: Rounded): number {
    const { figures } = this.quantity.asked;
    const allowance = defaultAllowance(this.quantity, key);
    const again = evaluateAmount(this.quantity.key, rounded(figures));
    if (again === null || !isFiniteAmount(again)) return Infinity;
    if (allowance.tolerance === 0) return matches(again, key, allowance) && matches(asPrinted(key, this.quantity), key, allowance) ? 0 : Infinity;
    const written = roundAmount(again, figures);
    const linear = Math.abs(magnitude(written) - magnitude(key));
    if (typeof key === 'number' && typeof written === 'number') return (Math.abs(written - key) - Math.abs(key) * 1e-12) / allowance.tolerance;
    const turned = typeof key === 'number' || typeof written === 'number' ? 0 : angleBetween(key, written) / (allowance.angle ?? 0.5);
    return Math.max(linear / allowance.tolerance, turned);
  }

  finish(): Finding[] {
    return [...this.signs(), ...this.missteps(), ...this.window()];
  }

  private signs(): Finding[] {
    const [rarer, other] = this.above.count < this.below.count ? [this.above, this.below] : [this.below, this.above];
    if (this.quantity.signed || rarer.count === 0 || other.count === 0) return [];
    return [this.finding('sign-change', rarer, `The key is above zero in ${this.above.count} draws and below in ${this.below.count}: require one sign, or state sign: either.`)];
  }

  private missteps(): Finding[] {
    return this.quantity.missteps.flatMap((misstep, index) => {
      if (misstep.separatedBy !== undefined) return [];
      const accepted = this.accepted[index];
      const crowded = this.crowded[index];
      if (accepted && accepted.count > 0.01 * this.draws)
        return [this.finding('misstep-accepted', accepted, `The tolerance accepts "${misstep.says}" in ${percent(accepted.count / this.draws)} of the draws: narrow the tolerance, require a larger gap, or ask for that step in an earlier part and name it in separated-by.`)];
      if (crowded && crowded.count > 0.05 * this.draws)
        return [this.finding('window', crowded, `The tolerance is more than half the gap to "${misstep.says}" in ${percent(crowded.count / this.draws)} of the draws: narrow the tolerance or require a larger gap.`)];
      return [];
    });
  }

  private window(): Finding[] {
    const sorted = this.moved.map(({ ratio }) => ratio).sort((a, b) => a - b);
    if (sorted.length === 0 || quantile(sorted, 0.99) <= 1) return [];
    const outside = new Tally();
    for (const { ratio, seed } of this.moved) if (ratio > 1) outside.add(seed);
    const figures = this.quantity.asked.figures;
    const advice = this.figuresGiven ? 'widen the tolerance or ask for more figures' : 'ask for more figures or widen the tolerance';
    return [this.finding('window', outside, `Honest work rounded to ${figures} figures falls outside the tolerance in ${percent(outside.count / this.draws)} of the draws: ${advice}.`)];
  }

  private finding(code: ProblemCode, tally: Tally, says: string): Finding {
    return { code, says, count: tally.count, share: this.draws === 0 ? 0 : tally.count / this.draws, seeds: tally.seeds };
  }
}
