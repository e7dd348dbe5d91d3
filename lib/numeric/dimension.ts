/** Names of the base dimensions, in the order of a Dimension: the SI's, and money and wire gauge beside them. */
export const BASES = ['m', 'kg', 's', 'A', 'K', 'cd', 'money', 'gauge'] as const;

/** Exponents of the base dimensions, in the order of BASES. All zero: a pure number, an angle, a percentage. */
export type Dimension = readonly number[];

export const DIMENSIONLESS: Dimension = BASES.map(() => 0);

/** Reads 'm2 kg s-3 A-1' (bases with exponents; an exponent of 1 is left out). For tables: an unknown base throws. */
export function dimension(text: string): Dimension {
  const exponents = BASES.map(() => 0);
  for (const term of text.split(' ').filter(Boolean)) {
    const base = term.replace(/-?\d+$/, '');
    const index = (BASES as readonly string[]).indexOf(base);
    if (index < 0) throw new Error(`Unknown base dimension ${base}`);
    exponents[index] = term === base ? 1 : Number(term.slice(base.length));
  }
  return exponents;
}

export const equalDimensions = (a: Dimension, b: Dimension): boolean => a.every((exponent, i) => Math.abs(exponent - (b[i] ?? 0)) < 1e-9);
export const multiplyDimensions = (a: Dimension, b: Dimension): Dimension => a.map((exponent, i) => exponent + (b[i] ?? 0));
export const raiseDimension = (a: Dimension, power: number): Dimension => a.map((exponent) => exponent * power + 0);
export const isDimensionless = (a: Dimension): boolean => a.every((exponent) => Math.abs(exponent) < 1e-9);
