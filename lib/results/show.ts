import { notationOf } from '@/lib/numeric/notation';
import { printNumber } from '@/lib/numeric/printer';
import type { SchoolSettings } from '@/lib/school/model';

type Style = Pick<SchoolSettings, 'locale' | 'totalDecimals'>;

/** Decimals that a figure needs, at least the school's: a quarter mark is never rounded away. */
export function decimalsFor(values: readonly number[], style: Pick<Style, 'totalDecimals'>): number {
  return values.reduce((most, value) => Math.max(most, (String(value).split('.')[1] ?? '').length), style.totalDecimals);
}

/** Marks or a share as printed, in the school's notation. */
export const showMarks = (value: number, style: Style): string => printNumber(value, { decimals: decimalsFor([value], style) }, notationOf(style.locale));
/** What marks are out of: whole where it is whole. */
export const showOf = (value: number, style: Style): string => printNumber(value, { decimals: decimalsFor([value], { totalDecimals: 0 }) }, notationOf(style.locale));
