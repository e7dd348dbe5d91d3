import { DIMENSIONLESS, equalDimensions, isDimensionless } from '@/lib/numeric/dimension';
import type { Dimension } from '@/lib/numeric/dimension';
import { nameOfDimension } from '@/lib/numeric/unit-names';

/**
 * What the check knows of a value: its dimension, null for a bare number that takes the dimension of what it stands
 * beside; and the coherent SI units in one of it, null where a number of the expression may be a conversion (60, 1000).
 * A Unit is one.
 */
export type Quantity = { dimension: Dimension | null; factor: number | null };

/** `dimension`: the dimensions do not fit; `factor`: they do, and the unit factors do not cancel. */
export type DimensionProblem = { problem: 'dimension' | 'factor'; says: string };

/** Leaves the walk at the first misfit. Never leaves this folder. */
export class Misfit extends Error {
  constructor(readonly problem: DimensionProblem) {
    super(problem.says);
  }
}

export const misfit = (problem: DimensionProblem['problem'], says: string): never => {
  throw new Misfit({ problem, says });
};

export const PURE: Quantity = { dimension: DIMENSIONLESS, factor: 1 };

export const isPure = ({ dimension }: Quantity): boolean => dimension === null || isDimensionless(dimension);
export const sameFactor = (a: number, b: number): boolean => Math.abs(a - b) <= 1e-9 * Math.max(Math.abs(a), Math.abs(b));
export const inWords = ({ dimension }: Quantity): string => (dimension === null ? 'a pure number' : nameOfDimension(dimension));

/**
 * Two values that are added, compared or stand for one another. A bare number takes the other's unit, except beside a
 * pure number, where it counts as 1 (1 - s with s in percent does not fit).
 */
export function merge(a: Quantity, b: Quantity, where: string): Quantity {
  if (a.dimension !== null && b.dimension !== null && !equalDimensions(a.dimension, b.dimension)) {
    misfit('dimension', `${where} brings together ${inWords(a)} and ${inWords(b)}.`);
  }
  const [bare, other] = a.dimension === null ? [a, b] : [b, a];
  if (a.factor === null || b.factor === null) return { dimension: other.dimension, factor: null };
  const adopts = bare.dimension === null && !isPure(other);
  if (!adopts && !sameFactor(a.factor, b.factor)) {
    misfit('factor', `${where} brings together values of the same kind in units of different size; convert one of them.`);
  }
  return { dimension: other.dimension, factor: other.factor };
}

/** A scope for what depends on no value. */
export const MISSING_VALUES = { values: {}, parts: {} };
