import { defaultPolicy, type Tolerances } from '@/lib/marking/policy';
import type { Unit } from '@/lib/numeric/units';

/** A number or a complex number as plain data. */
export type Amount = number | { re: number; im: number };

/** What a part accepts, read: `within` a share of the key, `or` an amount in the part's unit, `angle` in degrees. */
export interface Accept { exact: boolean; within?: number; or?: number; angle?: number }
/** What an answer may differ by: `tolerance` in the part's unit (of the magnitude, where complex), `angle` in degrees. */
export interface Allowance { tolerance: number; angle?: number }

/** The sort of quantity that a default tolerance depends on. */
export interface Asked { unit: Unit; figures: number; complex: boolean; whole: boolean }

const countUnits = new Set(['AWG']);

export const magnitude = (amount: Amount): number => (typeof amount === 'number' ? Math.abs(amount) : Math.hypot(amount.re, amount.im));
export const isFiniteAmount = (amount: Amount): boolean =>
  typeof amount === 'number' ? Number.isFinite(amount) : Number.isFinite(amount.re) && Number.isFinite(amount.im);

/** What is accepted where the part states nothing. */
const byDefault = (asked: Asked, tolerances: Tolerances): Accept => {
  if (countUnits.has(asked.unit.code) || asked.whole) return { exact: true };
  if (asked.unit.code === 'percent') return { exact: false, or: tolerances.percentPoints };
  if (asked.unit.code === 'deg') return { exact: false, or: tolerances.degrees };
  return { exact: false, within: asked.figures >= 4 ? tolerances.closer : tolerances.relative };
};

/** The difference from this key that is still right: the larger of what is written, or the policy's default. */
export function allowanceOf(key: Amount, accept: Accept | null, asked: Asked, tolerances: Tolerances = defaultPolicy.tolerances): Allowance {
  const rule = accept ?? byDefault(asked, tolerances);
  const linear = accept !== null && accept.within === undefined && accept.or === undefined && !accept.exact ? byDefault(asked, tolerances) : rule;
  const tolerance = rule.exact ? 0 : Math.max((linear.within ?? 0) * magnitude(key), linear.or ?? 0);
  return asked.complex ? { tolerance, angle: rule.angle ?? tolerances.degrees } : { tolerance };
}

/** Room for the last bits of floating-point arithmetic, so that an answer on the limit is inside it. */
const slack = (key: number, tolerance: number) => tolerance * 1e-9 + Math.abs(key) * 1e-9 + 1e-15;

/** Angle from one phasor to another [deg], 0 to 180. */
export const angleBetween = (a: { re: number; im: number }, b: { re: number; im: number }): number =>
  Math.abs(Math.atan2(a.im * b.re - a.re * b.im, a.re * b.re + a.im * b.im)) * (180 / Math.PI);

const phasor = (amount: Amount) => (typeof amount === 'number' ? { re: amount, im: 0 } : amount);

/** Whether a value lies within the allowance of a key. */
export function matches(value: Amount, key: Amount, allowance: Allowance): boolean {
  if (!isFiniteAmount(value) || !isFiniteAmount(key)) return false;
  if (typeof value === 'number' && typeof key === 'number') return Math.abs(value - key) <= allowance.tolerance + slack(key, allowance.tolerance);
  const size = magnitude(key);
  if (Math.abs(magnitude(value) - size) > allowance.tolerance + slack(size, allowance.tolerance)) return false;
  return size <= allowance.tolerance || angleBetween(phasor(value), phasor(key)) <= (allowance.angle ?? 0.5) + 1e-9;
}

/** Distance between two amounts in their unit. */
export const distance = (a: Amount, b: Amount): number => {
  const [p, q] = [phasor(a), phasor(b)];
  return Math.hypot(p.re - q.re, p.im - q.im);
};
