import { describe, expect, it } from 'vitest';
import { compile } from '@/lib/expressions/compile';
import { checkDimension, dimensionOf } from '@/lib/expressions/dimension';
import { parseUnit } from '@/lib/numeric/units';

const unit = (code: string) => {
  const found = parseUnit(code);
  if (!found) throw new Error(`No unit ${code}`);
  return found;
};

const UNITS: Record<string, string> = {
  V: 'V', Ia: 'A', Ra: 'ohm', P: 'kW', Pw: 'W', Ph: 'hp', n: 'rpm', n0: 'rpm', T: 'N m', Tf: 'lbf ft', om: 'rad/s', s: 'percent', w: 'percent', f: 'Hz', p: 'none', pf: 'none',
  th: 'deg', t: 'degC', t0: 'degC', R1: 'ohm', K: 'ohm cmil/ft', L: 'ft', CM: 'cmil', ms: 'ms', tau: 's', S: 'kVA', Q: 'kvar', X: 'ohm', r: 'ohm/km', km: 'km', ft: 'ft', mA: 'mA', Em: 'lx',
};
const names = { values: new Set(Object.keys(UNITS)), parts: new Set(['a']) };
const units = { name: (name: string) => unit(UNITS[name] ?? ''), part: () => unit('A') };

const check = (source: string, target: string) => {
  const compiled = compile(source, names);
  if (!compiled.ok) throw new Error(compiled.says);
  return checkDimension(compiled.value, units, unit(target))?.problem ?? null;
};

describe('the units of a key', () => {
  it.each([
    ['V - Ia * Ra', 'V'], ['V - part.a * Ra', 'V'], ['V / Ra', 'A'], ['Ia^2 * Ra', 'W'], ['1000 * P / V', 'A'], ['P * 1000 / (V * pf)', 'A'], ['120 * f / p', 'rpm'],
    ['120 * f / p * (1 - s / 100)', 'rpm'], ['(n0 - n) / n * 100', 'percent'], ['n0 * V / (V - Ia * Ra) / (w / 100)', 'rpm'], ['2 * pi * n / 60', 'rad/s'],
    ['60 / (2 * pi) * Pw / n', 'N m'], ['Pw / om', 'N m'], ['T * om', 'W'], ['5252 * Ph / n', 'lbf ft'], ['sqrt(3) * V * Ia', 'VA'], ['sqrt(3) * V * Ia * pf', 'W'],
    ['sqrt(S^2 - Q^2)', 'kW'], ['S * cosd(th)', 'kW'], ['acosd(pf)', 'deg'], ['sqrt(Ra^2 + X^2)', 'ohm'], ['abs(Ra + i * X)', 'ohm'], ['R1 * (234.5 + t) / (234.5 + t0)', 'ohm'],
    ['2 * K * Ia * L / CM', 'V'], ['exp(-ms / 1000 / tau) * V', 'V'], ['r * km', 'ohm'], ['V - 2 - Ia * Ra', 'V'], ['max(0, V - Ia * Ra)', 'V'], ['V > 200 ? Ia : 2 * Ia', 'A'],
    ['746 * Ph / V', 'A'], ['5', 'A'], ['polard(V, -30) / (Ra + i*X)', 'A'], ['(V - Ia * Ra) / V', 'none'],
  ])('%s fits %s', (source, target) => expect(check(source, target)).toBeNull());

  it.each([
    ['V - Ia', 'V'], ['V * Ra', 'A'], ['V + Ia * Ra', 'A'], ['V + Ra * P', 'V'], ['Ia * Ra + P', 'V'], ['sind(V)', 'none'], ['2 ^ Ra', 'none'], ['V ^ pf', 'V'],
    ['V > Ia ? V : V', 'V'], ['max(V, Ia)', 'V'], ['exp(tau)', 'none'], ['between(V, Ia, 3) ? V : 0', 'V'], ['1000 * Ph / V', 'V'], ['log(Ra)', 'none'],
  ])('%s is not in %s: the dimensions differ', (source, target) => expect(check(source, target)).toBe('dimension'));

  it.each([
    ['P / V', 'A'], ['(n0 - n) / n', 'percent'], ['Ph / om', 'N m'], ['2 * pi * n * T', 'W'], ['2 * pi * n', 'rad/s'], ['n * (1 - s)', 'rpm'], ['P + Pw', 'kW'], ['sin(th)', 'none'],
    ['acos(pf)', 'deg'], ['exp(-ms / tau)', 'none'], ['Ia + mA', 'A'], ['sqrt(3) * V * Ia', 'kVA'], ['r * ft', 'ohm'], ['4 * Ph / V', 'A'], ['V / mA', 'ohm'], ['n0 / (w)', 'rpm'],
  ])('%s is not in %s: the units do not cancel', (source, target) => expect(check(source, target)).toBe('factor'));

  it('says what came out and what was asked, in words', () => {
    const compiled = compile('V * Ia', names);
    if (!compiled.ok) throw new Error(compiled.says);
    expect(checkDimension(compiled.value, units, unit('V'))?.says).toBe('V * Ia comes out in watts, and volts are asked.');
    const kilo = compile('P / V', names);
    if (!kilo.ok) throw new Error(kilo.says);
    expect(checkDimension(kilo.value, units, unit('A'))?.says).toContain('1000 times too small');
  });

  it('finds the dimension of a derived value, and hands on that a number may have converted', () => {
    const derive = (source: string) => {
      const compiled = compile(source, names);
      if (!compiled.ok) throw new Error(compiled.says);
      return dimensionOf(compiled.value, units);
    };
    expect(derive('V / Ra')).toMatchObject({ ok: true, value: { dimension: unit('A').dimension, factor: 1 } });
    expect(derive('Ia / (w / 100)')).toMatchObject({ ok: true, value: { dimension: unit('A').dimension, factor: null } });
    expect(derive('P / V')).toMatchObject({ ok: true, value: { factor: 1000 } });
    expect(derive('V + Ia')).toMatchObject({ ok: false, problem: { problem: 'dimension' } });
  });
});
