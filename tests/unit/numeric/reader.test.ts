import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { printNumber } from '@/lib/numeric/printer';
import { LONGEST_ANSWER, readNumber } from '@/lib/numeric/reader';
import type { Asked, Reading } from '@/lib/numeric/reader';
import { parseUnit } from '@/lib/numeric/units';

const read = (text: string, code: string, more: Partial<Asked> = {}): Reading => {
  const unit = parseUnit(code);
  if (!unit) throw new Error(`No unit ${code}`);
  return readNumber(text, { unit, notation: { decimal: '.' }, ...more });
};
const comma = { notation: { decimal: ',' } } as const;

const value = (reading: Reading): number => {
  if (!reading.ok) throw new Error(reading.says);
  return reading.value;
};

describe('reading a number', () => {
  it.each([
    ['221.4 V', 'V', 221.4], ['0.2214 kV', 'V', 221.4], ['221,4 V', 'V', 221.4], ['1 500', 'rpm', 1500], ['1,500', 'rpm', 1500], ['1,234.5', 'W', 1234.5],
    ['1.234,5', 'W', 1234.5], ['1\u202f234\u202f567', 'W', 1234567], ['2.214e2 V', 'V', 221.4], ['2.214×10² V', 'V', 221.4], ['3 x 10^-3 A', 'mA', 3],
    ['1k5', 'ohm', 1500], ['4R7', 'ohm', 4.7], ['R47', 'ohm', 0.47], ['2M2 Ω', 'ohm', 2.2e6], ['20k', 'ohm', 20000], ['20k', 'kohm', 20], ['20 k', 'W', 20000],
    ['10 µF', 'uF', 10], ['10 uF', 'F', 1e-5], ['5 Ω', 'ohm', 5], ['5 ohm', 'ohm', 5], ['1750 r/min', 'rpm', 1750], ['1750 rpm', 'rpm', 1750],
    ['1750 RPM', 'rpm', 1750], ['5 Nm', 'N m', 5], ['50 lb-ft', 'lbf ft', 50], ['50 ft-lb', 'lbf ft', 50], ['60 amps', 'A', 60], ['2/3', 'none', 2 / 3],
    ['1 1/2 hp', 'hp', 1.5], ['−5 V', 'V', -5], ['-5 V', 'V', -5], ['+5', 'V', 5], ['.5', 'A', 0.5], ['71.4 %', 'percent', 71.4], ['71.4', 'percent', 71.4],
    ['0.714', 'percent', 0.714], ['71.4 %', 'none', 0.714], ['Ia = 77.6 A', 'A', 77.6], ['221.4 V dc', 'V', 221.4], ['4/0', 'AWG', -3], ['#12', 'AWG', 12],
    ['$12.50', 'money', 12.5], ['36.9°', 'deg', 36.9], ['5 mΩ', 'ohm', 0.005], ['5 MΩ', 'ohm', 5e6], ['5KW', 'kW', 5],
  ])('reads %s asked in %s', (text, unit, expected) => expect(value(read(text, unit))).toBeCloseTo(expected, 9));

  it.each([['221,4 V', 'V', 221.4], ['1,500', 'rpm', 1.5], ['1.500', 'rpm', 1500], ['1.234,5', 'W', 1234.5], ['1 500', 'rpm', 1500], ['0.500', 'A', 0.5]])(
    'reads %s asked in %s where the comma is the decimal mark', (text, unit, expected) => expect(value(read(text, unit, comma))).toBeCloseTo(expected, 9));

  it('says what it read, in words and in the notation of the paper', () => {
    expect(read('0.2214 kV', 'V')).toMatchObject({ says: 'reads as 221.4 volts', shown: { value: '221.4', unit: 'volts' }, unitGiven: true, unit: 'kV' });
    expect(read('221.4 V', 'V', comma)).toMatchObject({ says: 'reads as 221,4 volts' });
    expect(read('1 V', 'V')).toMatchObject({ says: 'reads as 1 volt' });
    expect(read('60', 'A', { unitMissing: 'lose' })).toMatchObject({ unitGiven: false, says: 'reads as 60 amperes; the unit is missing' });
  });

  it('shows what reads in two ways', () => {
    expect(read('1,500', 'rpm')).toMatchObject({ value: 1500, ambiguous: { value: 1.5 } });
    expect(read('0.714', 'percent', { ratio: true })).toMatchObject({ value: 71.4, ambiguous: { value: 0.714 } });
    expect(read('0.714 %', 'percent', { ratio: true })).toMatchObject({ value: 0.714 });
    expect(read('1,500.5', 'rpm')).not.toHaveProperty('ambiguous');
  });

  it.each([['12.4∠−36.9° A', 12.4 * Math.cos(0.644026), -12.4 * Math.sin(0.644026)], ['9.9−j7.4 A', 9.9, -7.4], ['9.9 - 7.4j', 9.9, -7.4], ['(9.9+i7.4) A', 9.9, 7.4], ['-j5', 0, -5], ['12 A', 12, 0]])(
    'reads the complex number %s', (text, re, im) => {
      const reading = read(text, 'A', { form: 'complex' });
      expect(value(reading)).toBeCloseTo(re, 3);
      expect(reading.ok && reading.imaginary).toBeCloseTo(im, 3);
    });

  it.each([
    ['', 'V', 'blank'], ['  ', 'V', 'blank'], ['five', 'V', 'unread'], ['1.2.3', 'V', 'unread'], ['1e999', 'V', 'unread'], ['1/0', 'V', 'unread'], ['12 45 V', 'V', 'unit'],
    ['5 kVA', 'kW', 'dimension'], ['5 kvar', 'kW', 'dimension'], ['5 kW', 'kVA', 'dimension'], ['5 s', 'V', 'dimension'], ['4R7', 'V', 'dimension'], ['20 Hz', 'rpm', 'dimension'],
    ['5 foo', 'V', 'unit'], ['12∠5°', 'A', 'unread'], ['NaN', 'V', 'unread'], ['Infinity', 'V', 'unread'], ['--5', 'V', 'unread'],
  ])('does not read %s asked in %s: %s', (text, unit, code) => expect(read(text, unit)).toMatchObject({ ok: false, code }));

  it('refuses what is longer than an answer may be', () => {
    expect(read('1'.repeat(LONGEST_ANSWER + 1), 'V')).toMatchObject({ ok: false, code: 'too-long' });
  });

  it('gives back every number that is printed, in either notation', () => {
    fc.assert(fc.property(fc.double({ noNaN: true, noDefaultInfinity: true, min: -1e20, max: 1e20 }), fc.integer({ min: 1, max: 15 }), fc.constantFrom('.', ','),
      (number, figures, decimal) => {
        const notation = { decimal } as const;
        const printed = printNumber(number, { figures }, notation);
        const reading = read(printed, 'V', { notation });
        const expected = Number(number.toPrecision(figures));
        expect(Math.abs(value(reading) - expected)).toBeLessThanOrEqual(Math.abs(number) * 10 ** (1 - figures) * (1 + 1e-9));
        expect(printNumber(value(reading), { figures }, notation)).toBe(printed);
        expect(reading).not.toHaveProperty('ambiguous');
      }));
  });

  it('never throws, whatever is typed', () => {
    const signs = fc.constantFrom(...'0123456789.,-+eEkRmMµΩ∠°j/()=×^ %$#<@ VA'.split(''));
    fc.assert(fc.property(fc.array(signs, { maxLength: 40 }), fc.constantFrom('V', 'percent', 'AWG', 'ohm/km', 'money', 'deg'), (text, unit) => {
      const reading = read(text.join(''), unit, { form: 'complex', ratio: true });
      if (reading.ok) expect(Number.isFinite(reading.value)).toBe(true);
      else expect(reading.says.length).toBeGreaterThan(10);
    }), { numRuns: 2000 });
  });

  it('takes no longer than its length asks for on hostile answers', () => {
    const hostile = ['1', '1,', '1 ', '1 111', '1e', '-', '(', 'k', '1/', '×10', 'V ', 'V/', 'V-', '∠', 'j', '⁻', '=', '10^', '.', 'm'];
    const time = (text: string) => {
      const start = performance.now();
      for (let i = 0; i < 20; i += 1) read(text, 'V', { form: 'complex' });
      return (performance.now() - start) / 20;
    };
    for (const seed of hostile) expect(time(seed.repeat(200).slice(0, 200)), seed).toBeLessThan(25);
    expect(time('1 '.repeat(500_000))).toBeLessThan(25);
  });
});
