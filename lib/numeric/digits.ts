/** A finite number as its shortest exact decimal: value = ±0.d1d2d3… × 10^point, where digits holds d1d2d3… without outer zeros. */
export type Decimals = { negative: boolean; digits: string; point: number };

/** Takes a finite number apart; zero has no digits. Throws RangeError for an infinity or NaN. */
export function decimalsOf(value: number): Decimals {
  if (!Number.isFinite(value)) throw new RangeError(`${value} has no decimal digits`);
  if (value === 0) return { negative: false, digits: '', point: 0 };
  const [mantissa = '', exponent = '0'] = Math.abs(value).toExponential().split('e');
  return { negative: value < 0, digits: mantissa.replace('.', ''), point: Number(exponent) + 1 };
}

/** Rounds half away from zero on the shortest decimal digits, as a person does on paper (1.005 to two decimals is 1.01). */
function keep(parts: Decimals, count: number): Decimals {
  if (parts.digits.length <= count) return parts;
  if (count < 0) return { ...parts, digits: '' };
  const up = (parts.digits[count] ?? '0') >= '5';
  const kept = parts.digits.slice(0, count);
  if (!up) return { ...parts, digits: kept };
  let i = count - 1;
  while (i >= 0 && kept[i] === '9') i -= 1;
  if (i < 0) return { ...parts, digits: '1', point: parts.point + 1 };
  return { ...parts, digits: kept.slice(0, i) + String(Number(kept[i]) + 1) };
}

export const numberOf = (parts: Decimals): number =>
  parts.digits === '' ? 0 : Number(`${parts.negative ? '-' : ''}0.${parts.digits}e${parts.point}`);

export const keepDecimals = (parts: Decimals, decimals: number): Decimals => keep(parts, parts.point + decimals);
export const keepFigures = (parts: Decimals, figures: number): Decimals => keep(parts, figures);

/** Rounds to a number of decimals (negative: tens, hundreds), half away from zero on the decimal digits. */
export const roundToDecimals = (value: number, decimals: number): number => numberOf(keepDecimals(decimalsOf(value), decimals));

/** Rounds to significant figures, half away from zero on the decimal digits. */
export const roundToFigures = (value: number, figures: number): number => numberOf(keepFigures(decimalsOf(value), figures));

/** value × 10^exponent without the error of a binary multiplication: 0.2214 shifted by 3 is 221.4. */
export function shift(value: number, exponent: number): number {
  if (!Number.isFinite(value)) return value;
  const parts = decimalsOf(value);
  return numberOf({ ...parts, point: parts.point + exponent });
}
