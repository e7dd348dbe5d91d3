import { createHash } from 'node:crypto';
import fc from 'fast-check';
import alea from 'seedrandom/lib/alea.js';
import { describe, expect, it } from 'vitest';
import { domainOf } from '@/lib/numeric/domain';
import type { DomainSpec } from '@/lib/numeric/domain';
import { nextIndex, shuffle, streamOf } from '@/lib/numeric/stream';
import reference from '../../reference/seedrandom-alea.json';

const valuesOf = (spec: DomainSpec) => {
  const domain = domainOf(spec);
  if (!domain.ok) throw new Error(domain.says);
  return Array.from({ length: domain.value.count }, (_, place) => domain.value.at(place));
};

describe('streams', () => {
  it.each(reference.vectors)('the generator gives the published outputs for the seed "$seed"', ({ seed, next }) => {
    const stream = alea(seed);
    expect(next.map(() => stream())).toEqual(next);
  });

  it('seeds with the SHA-256 of version, seed, name and redraw', () => {
    fc.assert(fc.property(fc.string({ unit: 'grapheme' }), fc.string(), fc.nat(500), (seed, name, redraw) => {
      const key = createHash('sha256').update(JSON.stringify([1, seed, name, redraw])).digest('hex');
      const [ours, expected] = [streamOf(seed, name, redraw), alea(key)];
      expect([ours(), ours()]).toEqual([expected(), expected()]);
    }));
  });

  it('keeps names and redraws apart, and shuffles evenly', () => {
    const firsts = ['V', 'Ra', 'IL'].flatMap((name) => [0, 1].map((redraw) => streamOf('s', name, redraw)()));
    expect(new Set(firsts).size).toBe(6);
    const places = [0, 0, 0, 0];
    for (let i = 0; i < 4000; i += 1) places[shuffle(['A', 'B', 'C', 'D'], streamOf(`s${i}`, 'options', 0)).indexOf('A')]! += 1;
    // chi-square with 3 degrees of freedom: 16.27 at p = 0.001
    expect(places.reduce((sum, count) => sum + (count - 1000) ** 2 / 1000, 0)).toBeLessThan(16.27);
    expect(nextIndex(() => 0.999999, 5)).toBe(4);
  });
});

describe('domains', () => {
  it('counts in exact decimals of the step', () => {
    const values = valuesOf({ range: [0.15, 0.45], step: 0.01 });
    expect(values).toHaveLength(31);
    expect(values[15]).toEqual({ value: 0.3, decimals: 2, digits: '0.30' });
    expect(values.at(-1)?.value).toBe(0.45);
    expect(valuesOf({ range: [0.1, 0.3], step: 0.1 }).map(({ value }) => value)).toEqual([0.1, 0.2, 0.3]);
    expect(valuesOf({ range: [40, 45], step: 2 }).map(({ value }) => value)).toEqual([40, 42, 44]);
  });

  it('takes preferred values as IEC 60063 lists them', () => {
    expect(valuesOf({ series: 'E24', range: [150, 300] }).map(({ value }) => value)).toEqual([150, 160, 180, 200, 220, 240, 270, 300]);
    expect(valuesOf({ series: 'E6', range: [0.47, 15] }).map(({ digits }) => digits)).toEqual(['0.47', '0.68', '1', '1.5', '2.2', '3.3', '4.7', '6.8', '10', '15']);
    expect(valuesOf({ series: 'E12', range: [10, 99] }).map(({ value }) => value)).toEqual([10, 12, 15, 18, 22, 27, 33, 39, 47, 56, 68, 82]);
    // IEC 60063: the E96 decade begins and ends so; E192 has 920 where the power rounds to 919
    const e96 = valuesOf({ series: 'E96', range: [100, 999] }).map(({ value }) => value);
    expect([e96.length, ...e96.slice(0, 5), ...e96.slice(-3)]).toEqual([96, 100, 102, 105, 107, 110, 931, 953, 976]);
    expect(valuesOf({ series: 'E192', range: [910, 930] }).map(({ value }) => value)).toEqual([920]);
  });

  it('keeps lists as they stand', () => {
    expect(valuesOf({ choose: [0.5, 230, 'lap'] })).toEqual([
      { value: 0.5, decimals: 1, digits: '0.5' }, { value: 230, decimals: 0, digits: '230' }, { value: 'lap', decimals: 0, digits: 'lap' },
    ]);
  });

  it.each<DomainSpec>([
    { choose: [] }, { range: [1, 2], step: 0 }, { range: [2, 1], step: 1 }, { range: [0, 1], step: 1e-9 }, { series: 'E25', range: [1, 2] },
    { series: 'constructor', range: [1, 2] }, { series: 'E24', range: [0, 2] }, { series: 'E6', range: [16, 21] }, { range: [0, Infinity], step: 1 },
  ])('refuses %o', (spec) => expect(domainOf(spec)).toMatchObject({ ok: false, code: 'schema' }));
});
