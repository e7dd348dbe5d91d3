import { describe, expect, it } from 'vitest';
import { answers, convert, parseUnit, sameDimension, unitReadings } from '@/lib/numeric/units';
import { UNIT_ROWS } from '@/lib/numeric/units-table';
import reference from '../../reference/unit-conversions.json';

const unit = (code: string) => {
  const found = parseUnit(code);
  if (!found) throw new Error(`No unit ${code}`);
  return found;
};

describe('units', () => {
  it.each(reference.conversions)('agrees with the definitions outside: $from in $to', ({ from, to, factor }) => {
    expect(convert(1, unit(from), unit(to)) / factor).toBeCloseTo(1, 10);
  });

  it('knows each of its rows by code, symbol and words, and gives the code back', () => {
    for (const row of UNIT_ROWS) {
      for (const name of [row.code, row.symbol, row.one, row.many]) expect(parseUnit(name)?.code, `${row.code} by ${name}`).toBe(row.code);
    }
  });

  it.each([
    ['r/min', 'rpm'], ['RPM', 'rpm'], ['rev/min', 'rpm'], ['Nm', 'N m'], ['N·m', 'N m'], ['lb-ft', 'lbf ft'], ['ft-lb', 'lbf ft'], ['lb·ft', 'lbf ft'],
    ['kΩ', 'kohm'], ['MΩ', 'Mohm'], ['µF', 'uF'], ['μF', 'uF'], ['amps', 'A'], ['kilovolts', 'kV'], ['megohms', 'Mohm'], ['%', 'percent'], ['°', 'deg'],
    ['ohms per kilometre', 'ohm/km'], ['Ω/km', 'ohm/km'], ['mm²', 'mm2'], ['V A', 'VA'], ['$/kWh', 'money/kWh'],
  ])('reads %s as %s', (text, code) => expect(parseUnit(text)?.code).toBe(code));

  it.each(['volt age', 'foo', 'V//A', 'M', 'mk V', 'constructor', '__proto__', 'V/A/s/m', 'V'.repeat(61)])('knows no unit %s', (text) => {
    expect(unitReadings(text)).toEqual([]);
  });

  it('keeps m and M, and the three powers, apart', () => {
    expect(unit('mohm').factor).toBe(1e-3);
    expect(unit('Mohm').factor).toBe(1e6);
    expect(unitReadings('mw').map(({ code }) => code)).toEqual(['mW']);
    expect(answers(unit('kVA'), unit('kW'))).toBe(false);
    expect(answers(unit('kvar'), unit('kW'))).toBe(false);
    expect(answers(unit('hp'), unit('kW'))).toBe(true);
    expect(answers(unit('Hz'), unit('rpm'))).toBe(false);
    expect(answers(unit('rad/s'), unit('rpm'))).toBe(true);
    expect(sameDimension(unit('kVA'), unit('kW'))).toBe(true);
    expect(sameDimension(unit('N m'), unit('J'))).toBe(true);
    expect(sameDimension(unit('V'), unit('A'))).toBe(false);
  });

  it('converts temperatures on their scales (fixed points of water: 32 and 212 degrees Fahrenheit)', () => {
    expect(convert(0, unit('degC'), unit('degF'))).toBeCloseTo(32, 9);
    expect(convert(212, unit('degF'), unit('degC'))).toBeCloseTo(100, 9);
  });

  it('moves the decimal mark without an error of binary fractions', () => {
    expect(convert(0.2214, unit('kV'), unit('V'))).toBe(221.4);
    expect(convert(1.005, unit('A'), unit('mA'))).toBe(1005);
  });
});
