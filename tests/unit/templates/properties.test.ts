import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { markQuestion } from '@/lib/marking/mark';
import { notationOf } from '@/lib/numeric/notation';
import { printNumber } from '@/lib/numeric/printer';
import { findUnit } from '@/lib/numeric/units';
import { allowanceOf, matches } from '@/lib/templates/tolerance';
import { drawOf, fixedMotor, templateOf } from '../../support/templates';

const motor = templateOf(fixedMotor
  .replace('choose: [0.4]', 'range: [0.15, 0.45], step: 0.01').replace('unit: V, choose: [230]', 'unit: V, range: [220, 260], step: 1').replace('choose: [50]', 'range: [40, 60], step: 1'));
const seeds = fc.string({ minLength: 1, maxLength: 24 });
const unit = (code: string) => {
  const found = findUnit(code);
  if (found === null) throw new Error(code);
  return found;
};
const asked = (code: string, figures = 3) => ({ unit: unit(code), figures, complex: false, whole: false });

describe('marking, always', () => {
  it('takes no misstep for the key, and calls it what it is', () => {
    fc.assert(fc.property(seeds, (seed) => {
      const draw = drawOf(motor, seed);
      for (const [index, part] of draw.parts.entries()) {
        for (const misstep of part.missteps) {
          const marked = markQuestion(motor, draw, { [part.part]: misstep.text }).parts[index];
          expect(marked?.verdict).toBe('misstep');
          expect(marked?.awarded).toBe(misstep.earns);
        }
      }
    }), { numRuns: 60 });
  });

  it('follows any wrong value through to full marks, and never gives more than the part has', () => {
    fc.assert(fc.property(seeds, fc.double({ min: 5, max: 30, noNaN: true }), fc.constantFrom('en', 'fr-CA', 'de'), (seed, wrong, locale) => {
      const draw = drawOf(motor, seed, locale);
      const [V, Ra] = [Number(draw.given.V?.value), Number(draw.given.Ra?.value)];
      const write = (value: number) => printNumber(value, { figures: 6 }, notationOf(locale));
      const a = Number(wrong.toPrecision(6));
      const b = Number((V - a * Ra).toPrecision(6));
      const marked = markQuestion(motor, draw, { a: `${write(a)} A`, b: `${write(b)} V`, c: `${write((a * b) / 1000)} kW` });
      expect(marked.parts.slice(1).map(({ awarded }) => awarded)).toEqual([2, 3]);
      for (const { awarded, of } of marked.parts) expect(awarded >= 0 && awarded <= of).toBe(true);
    }), { numRuns: 60 });
  });

  it('never throws and never gives marks for anything typed that is no number', () => {
    fc.assert(fc.property(fc.string({ maxLength: 220 }), (text) => {
      const marked = markQuestion(motor, drawOf(motor, 'x'), { a: text, b: text, c: text, toString: text, constructor: text });
      for (const { awarded, of, verdict } of marked.parts) {
        expect(awarded >= 0 && awarded <= of).toBe(true);
        if (!/\d/.test(text)) expect(['blank', 'unread', 'wrong']).toContain(verdict);
      }
    }), { numRuns: 300 });
  });
});

describe('tolerance', () => {
  // Defaults of the template language, Tolerance: 1 %; 0.5 % at four figures; 0.2 points; 0.5 degrees; sizes exact.
  it.each([
    ['V', 3, 200, 2], ['V', 4, 200, 1], ['percent', 3, 5, 0.2], ['percent', 4, 88, 0.2], ['deg', 3, 36.9, 0.5], ['AWG', 3, 12, 0], ['V', 3, -200, 2],
  ])('in %s with %i figures of %d is %d', (code, figures, key, tolerance) => {
    expect(allowanceOf(key, null, asked(code, figures)).tolerance).toBeCloseTo(tolerance, 12);
  });

  it('is the larger of what is written', () => {
    const accept = { exact: false, within: 0.005, or: 0.1 };
    expect(allowanceOf(10, accept, asked('A')).tolerance).toBe(0.1);
    expect(allowanceOf(100, accept, asked('A')).tolerance).toBe(0.5);
  });

  it('holds a phasor by magnitude and by angle', () => {
    const key = { re: 3, im: 4 };
    const allowance = allowanceOf(key, null, { unit: unit('A'), figures: 3, complex: true, whole: false });
    const turned = (degrees: number, size = 5) => ({ re: size * Math.cos(Math.atan2(4, 3) + (degrees * Math.PI) / 180), im: size * Math.sin(Math.atan2(4, 3) + (degrees * Math.PI) / 180) });
    expect(allowance).toEqual({ tolerance: 0.05, angle: 0.5 });
    expect([0.49, 0.51, -0.49, 359.6].map((degrees) => matches(turned(degrees), key, allowance))).toEqual([true, false, true, true]);
    expect([5.049, 5.051].map((size) => matches(turned(0, size), key, allowance))).toEqual([true, false]);
  });

  it('accepts exactly what lies within it', () => {
    fc.assert(fc.property(fc.double({ min: 0.01, max: 1e6, noNaN: true }), fc.double({ min: 0, max: 2, noNaN: true }), (key, times) => {
      fc.pre(Math.abs(times - 1) > 1e-6);
      const allowance = allowanceOf(key, null, asked('V'));
      expect(matches(key + times * allowance.tolerance, key, allowance)).toBe(times < 1);
      expect(matches(key - times * allowance.tolerance, key, allowance)).toBe(times < 1);
    }));
  });
});
