import { decimalsOf, keepDecimals, keepFigures, roundToFigures } from './digits';
import type { Decimals } from './digits';
import type { Notation } from './notation';
import type { Unit } from './units';

/** How far a number is printed: to decimals, or to significant figures. */
export type Style = { decimals: number } | { figures: number };

/** Between groups of thousands: the narrow no-break space. */
export const GAP = '\u202f';
export const MINUS = '\u2212';
const BEFORE_UNIT = '\u00a0';

const round = (value: number, style: Style): Decimals =>
  'decimals' in style ? keepDecimals(decimalsOf(value), style.decimals) : keepFigures(decimalsOf(value), style.figures);

/** Decimals to print after the mark, zeros at the end included. */
function decimalsShown(parts: Decimals, style: Style): number {
  if ('decimals' in style) return Math.max(0, style.decimals);
  return Math.max(0, style.figures - (parts.digits === '' ? 1 : parts.point));
}

type Signs = { minus: string; gap: string; mark: string; times: (exponent: number) => string };

function grouped(whole: string, gap: string): string {
  if (whole.length < 4) return whole;
  const first = whole.length % 3;
  const groups = first === 0 ? [] : [whole.slice(0, first)];
  for (let i = first; i < whole.length; i += 3) groups.push(whole.slice(i, i + 3));
  return groups.join(gap);
}

function fixed(parts: Decimals, decimals: number, signs: Signs): string {
  const padded = parts.digits.padStart(parts.digits.length + Math.max(0, -parts.point), '0');
  const point = Math.max(0, parts.point);
  const whole = padded.slice(0, point).padEnd(point, '0') || '0';
  const rest = padded.slice(point).padEnd(decimals, '0').slice(0, decimals);
  const sign = parts.negative && parts.digits !== '' ? signs.minus : '';
  return sign + grouped(whole, signs.gap) + (rest === '' ? '' : signs.mark + rest);
}

function print(value: number, style: Style, signs: Signs): string {
  const parts = round(value, style);
  const extreme = parts.digits !== '' && (parts.point > 15 || ('figures' in style && parts.point < -5));
  if (!extreme) return fixed(parts, decimalsShown(parts, style), signs);
  const figures = 'figures' in style ? style.figures : parts.digits.length;
  return fixed({ ...parts, point: 1 }, figures - 1, signs) + signs.times(parts.point - 1);
}

const raisedDigits = (exponent: number) =>
  [...String(exponent)].map((sign) => (sign === '-' ? '⁻' : ('⁰¹²³⁴⁵⁶⁷⁸⁹'[Number(sign)] ?? ''))).join('');

const textSigns = (notation: Notation): Signs => ({
  minus: MINUS, gap: GAP, mark: notation.decimal, times: (exponent) => `×10${raisedDigits(exponent)}`,
});

const texSigns = (notation: Notation): Signs => ({
  minus: '-', gap: '\\,', mark: notation.decimal === ',' ? '{,}' : '.', times: (exponent) => `\\times 10^{${exponent}}`,
});

/**
 * A finite number in print: rounded half away from zero, thousands set apart from four digits up, a true minus sign.
 * Beyond 10^15, or below 10^-6 where figures are asked, as a power of ten. Throws RangeError for NaN and infinities.
 */
export const printNumber = (value: number, style: Style, notation: Notation): string => print(value, style, textSigns(notation));

/** A number with all of its own decimals and no more. Throws RangeError for NaN and infinities. */
export function printShortest(value: number, notation: Notation): string {
  const { digits, point } = decimalsOf(value);
  const tiny = digits !== '' && point < -5;
  return printNumber(value, tiny ? { figures: digits.length } : { decimals: Math.max(0, digits.length - point) }, notation);
}

/** As printNumber, for a formula in TeX. */
export const numberToTex = (value: number, style: Style, notation: Notation): string => print(value, style, texSigns(notation));

/** An AWG size from its number: 0 is 1/0, -3 is 4/0. */
const gauge = (value: number) => (value <= 0 ? `${1 - Math.round(value)}/0` : String(Math.round(value)));

/** Value and unit as they stand on paper: `221.4 V`, `36.9°`, `$12.50`, `4/0 AWG`. */
export function printQuantity(value: number, style: Style, unit: Unit, notation: Notation): string {
  if (unit.code === 'AWG') return `${gauge(value)}${BEFORE_UNIT}AWG`;
  const number = printNumber(value, style, notation);
  if (unit.code === 'none') return number;
  if (unit.code === 'money') return number.startsWith(MINUS) ? `${MINUS}${unit.symbol}${number.slice(1)}` : unit.symbol + number;
  return number + (unit.code === 'deg' ? '' : BEFORE_UNIT) + unit.symbol;
}

/** Value and unit inside a formula in TeX. */
export function quantityToTex(value: number, style: Style, unit: Unit, notation: Notation): string {
  if (unit.code === 'AWG') return `${gauge(value)}\\ \\mathrm{AWG}`;
  const number = numberToTex(value, style, notation);
  if (unit.code === 'none') return number;
  if (unit.code === 'money') return number.startsWith('-') ? `-${unit.tex}${number.slice(1)}` : unit.tex + number;
  return number + (unit.code === 'deg' ? '' : '\\ ') + unit.tex;
}

/** A unit in words for a value: one volt, two volts. Empty for a pure number. */
export const unitInWords = (unit: Unit, value: number): string => (Math.abs(value) === 1 ? unit.one : unit.many);

/** 'shortest': what a person typed, or at most six figures of what a conversion made of it. */
const printIn = (style: Style | 'shortest', notation: Notation) => (value: number) =>
  style === 'shortest' ? printShortest(roundToFigures(value, 6), notation) : printNumber(value, style, notation);

/** A complex quantity in polar form, angle in degrees to one decimal: `12.4∠−36.9° A`. */
export function printPolar(re: number, im: number, style: Style | 'shortest', unit: Unit, notation: Notation): string {
  const angle = (Math.atan2(im, re) * 180) / Math.PI;
  const symbol = unit.symbol === '' ? '' : BEFORE_UNIT + unit.symbol;
  return `${printIn(style, notation)(Math.hypot(re, im))}∠${printNumber(angle, { decimals: 1 }, notation)}°${symbol}`;
}

/** A complex quantity in rectangular form: `9.9 − j7.4 A`. */
export function printRectangular(re: number, im: number, style: Style | 'shortest', unit: Unit, notation: Notation): string {
  const print = printIn(style, notation);
  const symbol = unit.symbol === '' ? '' : BEFORE_UNIT + unit.symbol;
  const below = print(im).startsWith(MINUS);
  return `${print(re)} ${below ? MINUS : '+'} j${print(Math.abs(im))}${symbol}`;
}
