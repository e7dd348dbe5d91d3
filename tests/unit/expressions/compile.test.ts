import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { ExpressionError, compile } from '@/lib/expressions/compile';
import type { Scope, Value } from '@/lib/expressions/compile';
import { FUNCTION_NAMES, RESERVED } from '@/lib/expressions/functions';

const names = { values: new Set(['V', 'Ra', 'IL', 'Ia1', 'w', 'winding', 'x', 'y']), parts: new Set(['a', 'b']) };
const scope: Scope = { values: { V: 250, Ra: 0.2, IL: 96, Ia1: 95, w: 80, winding: 'lap', x: 3, y: -4 }, parts: { a: 95, b: 231 } };

const evaluate = (source: string, at: Scope = scope): Value => {
  const compiled = compile(source, names);
  if (!compiled.ok) throw new Error(compiled.says);
  return compiled.value.evaluate(at);
};

describe('evaluation', () => {
  it.each<[string, Value]>([
    ['V - part.a * Ra', 231], ['-x^2', -9], ['2^-1', 0.5], ['(V - 10) / (x + 1)', 60], ['x > 1 and not (y > 0)', true], ['x > 5 or y < 0', true],
    ['0 < x < 4', true], ['x == 3 ? 1 : 2', 1], ['between(x, 3, 4)', true], ['0.1 + 0.2 == 0.3', true], ['0.1 + 0.2 > 0.3', false], ['0.1 + 0.2 <= 0.3', true],
    ['winding == "lap"', true], ['winding != "wave"', true], ['min(x, y, 2)', -4], ['max([x, y, 7])', 7], ['round(2.345, 2)', 2.35], ['round(-2.5)', -3],
    ['floor(-2.5)', -3], ['sind(30)', 0.5], ['cosd(60)', 0.5], ['sind(180)', 0], ['tand(45)', 1], ['asind(0.5)', 30], ['acosd(0)', 90], ['log10(1000)', 3],
    ['log(8, 2)', 3], ['sqrt(x^2 + y^2)', 5], ['abs(3 + 4*i)', 5], ['argd(polard(2, 30))', 30], ['re((1 + 2*i) * (3 - i))', 5], ['im((1 + 2*i) * (3 - i))', 5],
    ['conj(2*i)', { re: 0, im: -2 }], ['sign(y)', -1], ['exp(0)', 1], ['atan2(1, 1) * 4 == pi', true], ['2e3', 2000],
  ])('%s', (source, expected) => {
    const value = evaluate(source);
    if (typeof expected === 'number') expect(value).toBeCloseTo(expected, 12);
    else expect(JSON.parse(JSON.stringify(value))).toEqual(expected);
  });

  it('stays real where the values are real: a root of a negative number is no number', () => {
    expect([evaluate('sqrt(y)'), evaluate('log(y)'), evaluate('acos(x)'), evaluate('x / 0')]).toEqual([NaN, NaN, NaN, Infinity]);
  });

  it('takes complex values of a stored scope as plain data', () => {
    expect(evaluate('part.a / x', { ...scope, parts: { a: { re: 6, im: -9 } } })).toEqual({ re: 2, im: -3 });
  });

  it('names what it uses', () => {
    expect(compile('V - part.a * Ra + V', names)).toMatchObject({ ok: true, value: { names: ['V', 'Ra'], parts: ['a'] } });
  });

  it('throws for a missing value and for text or a yes where a number is needed', () => {
    expect(() => evaluate('V', { values: {}, parts: {} })).toThrow(ExpressionError);
    expect(() => evaluate('winding + 1')).toThrow(ExpressionError);
    expect(() => evaluate('V ? 1 : 2')).toThrow(ExpressionError);
    expect(() => evaluate('i < 2')).toThrow();
  });

  it('agrees with plain arithmetic', () => {
    const number = fc.double({ noNaN: true, min: -1e6, max: 1e6 });
    fc.assert(fc.property(number, number, number, (V, Ra, IL) => {
      expect(evaluate('(V - IL * Ra) / (V + 1e7) * sind(IL) ^ 2', { values: { V, Ra, IL }, parts: {} }))
        .toBeCloseTo(((V - IL * Ra) / (V + 1e7)) * Math.sin(((IL % 360) * Math.PI) / 180) ** 2, 3);
    }));
  });
});

describe('what is not let through', () => {
  it.each([
    ['ones(1e9)', 0], ['import({})', 0], ['evaluate("1")', 0], ['parse("1")', 0], ['simplify("1")', 0], ['createUnit("x")', 0], ['V.constructor', 0],
    ['part.constructor', 0], ['part["a"]', 0], ['V[1]', 0], ['toString()', 0], ['constructor', 0], ['V.toString()', 0], ['V = 2', 0], ['f(x) = x', 0], ['V; x', 0],
    ['{V: 1}', 0], ['1:3', 0], ['[1, 2]', 0], ['x!', 1], ["x'", 1], ['x % 2', 2], ['x xor y', 2], ['x to y', 2], ['2 ^ x ^ y', 2], ['2^-(3^4)', 1], ['2 V', 2],
    ['x .* y', 2], ['x | y', 2], ['null', 0], ['Infinity', 0], ['1e400', 0], ['"lap"', 0], ['"lap" + 1', 1], ['', 0], ['V *', 3], ['(V', 2], ['x ? 1', 5],
    ['min()', 0], ['sqrt', 0], ['sqrt(1, 2)', 0], ['x and 1', 0], ['(x > 1) + 1', 0], ['part', 0], ['random()', 0], ['factorial(5)', 0],
  ])('%s, at %d', (source, at) => {
    const refused = compile(source, names);
    expect(refused).toMatchObject({ ok: false, code: 'name' });
    expect(!refused.ok && refused.says.length).toBeGreaterThan(10);
    if (at > 0) expect(!refused.ok && refused.at).toBe(at);
  });

  it('says where, and what was probably meant', () => {
    expect(compile('V - ia1 * Ra', names)).toMatchObject({ ok: false, at: 4, says: expect.stringContaining('Did you mean Ia1?') as string });
    expect(compile('V - squrt(Ra)', names)).toMatchObject({ ok: false, at: 4, says: expect.stringContaining('Did you mean sqrt?') as string });
    expect(compile('V - part.c', names)).toMatchObject({ ok: false, at: 4, says: expect.stringContaining('no earlier part c') as string });
    expect(compile('2 V', names)).toMatchObject({ ok: false, says: 'Write * between 2 and V.' });
  });

  it('keeps the functions of machines for later', () => {
    for (const source of ['at(full).speed', 'at(full)']) expect(compile(source, names)).toMatchObject({ ok: false, code: 'schema' });
  });

  it('bounds length, depth and the number of terms', () => {
    for (const source of ['('.repeat(500), `${'-'.repeat(500)}1`, `${'not '.repeat(240)}x`, '1+'.repeat(499) + '1', 'x?'.repeat(300), '2^'.repeat(300), 'V'.repeat(5000),
      `max([${Array.from({ length: 65 }, () => '1').join(',')}])`]) {
      expect(compile(source, names), source.slice(0, 20)).toMatchObject({ ok: false, code: 'name' });
    }
  });

  it('never throws, and lets no name through that is not known', () => {
    const words = fc.constantFrom('V', 'x', 'part.a', 'sqrt', 'sin', '(', ')', '[', ']', '+', '-', '*', '/', '^', '==', '<', 'and', 'not ', '?', ':', '"lap"', '1', '.', ',', '=', ';', '!', "'", '%', 'i', '{', '}', '\n', '#', 'end', 'constructor', 'import', 'eval', '\\', '∞', '1e9');
    fc.assert(fc.property(fc.array(words, { maxLength: 12 }), (source) => {
      const compiled = compile(source.join(''), names);
      if (compiled.ok) expect([...names.values]).toEqual(expect.arrayContaining(compiled.value.names));
      else expect(compiled.at).toBeLessThanOrEqual(source.join('').length);
    }), { numRuns: 2000 });
  });

  it('reserves its words', () => {
    for (const word of ['pi', 'e', 'i', 'part', 'at', 'constructor', ...FUNCTION_NAMES]) expect(RESERVED.has(word)).toBe(true);
  });
});
