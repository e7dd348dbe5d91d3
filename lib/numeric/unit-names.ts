import { BASES, equalDimensions, isDimensionless } from './dimension';
import type { Dimension } from './dimension';
import { UNIT_ROWS } from './units-table';

/** A dimension in the words of its unit: `volts`, `newtons`; where it has none of its own, as powers of base units. */
export function nameOfDimension(dimension: Dimension): string {
  if (isDimensionless(dimension)) return 'a pure number';
  const row = UNIT_ROWS.find((unit) => unit.factor === 1 && unit.many !== '' && equalDimensions(unit.dimension, dimension));
  if (row) return row.many;
  const powers = BASES.map((base, i) => [base, dimension[i] ?? 0] as const).filter(([, power]) => power !== 0);
  return powers.map(([base, power]) => (power === 1 ? base : `${base}^${Number(power.toFixed(3))}`)).join(' ');
}
