import { describe, expect, it } from 'vitest';
import { roundToDecimals, roundToFigures } from '@/lib/numeric/digits';
import { notationOf } from '@/lib/numeric/notation';
import { numberToTex, printNumber, printPolar, printQuantity, printRectangular, quantityToTex } from '@/lib/numeric/printer';
import { parseUnit } from '@/lib/numeric/units';

const point = { decimal: '.' } as const;
const comma = { decimal: ',' } as const;
const unit = (code: string) => {
  const found = parseUnit(code);
  if (!found) throw new Error(`No unit ${code}`);
  return found;
};

describe('printing', () => {
  it.each([
    [221.4, { decimals: 1 }, '221.4'], [1500, { decimals: 0 }, '1\u202f500'], [123456, { figures: 4 }, '123\u202f500'], [-0.5, { decimals: 1 }, '\u22120.5'],
    [-0.04, { decimals: 1 }, '0.0'], [9.996, { figures: 3 }, '10.0'], [0.05, { figures: 3 }, '0.0500'], [0, { figures: 3 }, '0.00'], [0.3, { decimals: 2 }, '0.30'],
    [1.005, { decimals: 2 }, '1.01'], [2.5, { decimals: 0 }, '3'], [1.234e-7, { figures: 3 }, '1.23×10⁻⁷'], [6.022e23, { figures: 3 }, '6.02×10²³'],
    [1234567.89, { decimals: 1 }, '1\u202f234\u202f567.9'],
  ])('prints %d %o as %s', (value, style, printed) => expect(printNumber(value, style, point)).toBe(printed));

  it('writes the comma where the locale does', () => {
    expect([notationOf('en-CA').decimal, notationOf('fr-CA').decimal, notationOf('de-DE').decimal]).toEqual(['.', ',', ',']);
    expect(printNumber(1221.4, { decimals: 1 }, comma)).toBe('1\u202f221,4');
    expect(numberToTex(-1221.4, { decimals: 1 }, comma)).toBe('-1\\,221{,}4');
  });

  it('puts each unit where it is written', () => {
    expect(printQuantity(221.4, { decimals: 1 }, unit('V'), point)).toBe('221.4\u00a0V');
    expect(printQuantity(36.9, { decimals: 1 }, unit('deg'), point)).toBe('36.9°');
    expect(printQuantity(-12.5, { decimals: 2 }, unit('money'), point)).toBe('\u2212$12.50');
    expect(printQuantity(-3, { decimals: 0 }, unit('AWG'), point)).toBe('4/0\u00a0AWG');
    expect(printQuantity(0.8, { decimals: 2 }, unit('none'), point)).toBe('0.80');
    expect(quantityToTex(1750, { decimals: 0 }, unit('rpm'), point)).toBe('1\\,750\\ \\mathrm{r/min}');
    expect(printPolar(9.916, -7.445, { figures: 3 }, unit('A'), point)).toBe('12.4∠\u221236.9°\u00a0A');
    expect(printRectangular(9.9, -7.4, { decimals: 1 }, unit('A'), point)).toBe('9.9 \u2212 j7.4\u00a0A');
  });

  it('rounds as on paper, and has nothing to print for what is no number', () => {
    expect([roundToDecimals(1.005, 2), roundToDecimals(-2.5, 0), roundToDecimals(1250, -2), roundToFigures(0.0012345, 4), roundToFigures(999.6, 3)]).toEqual([1.01, -3, 1300, 0.001235, 1000]);
    expect(() => printNumber(NaN, { decimals: 0 }, point)).toThrow(RangeError);
  });
});
