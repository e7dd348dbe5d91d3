import { describe, expect, it } from 'vitest';
import { checkInSteps, checkTemplate } from '@/lib/templates/check';
import type { CheckReport } from '@/lib/templates/check';
import { templateOf } from '../../support/templates';

/** A motor whose draws vary enough to be in order; each case below breaks one thing of it. */
const sound = `template: sound-motor
language: 1
title: A motor in order
area: motors
level: 1
minutes: 5
given:
  V: { label: Supply voltage, unit: V, range: [220, 260], step: 1 }
  Ra: { label: Armature circuit, unit: ohm, range: [0.3, 0.5], step: 0.01 }
  Ia: { label: Armature current, unit: A, range: [40, 60], step: 1 }
stem: A motor on {{V}} takes {{Ia}}.
parts:
  - part: a
    kind: number
    ask: Find the back-EMF.
    key: V - Ia * Ra
    unit: V
    marks: 2
    figures: 4
    missteps:
      - { key: V + Ia * Ra, says: the drop is added }
solution: "{{part.a}}"
`;
const draws = 400;
const check = (text: string): CheckReport => checkTemplate(templateOf(text), { draws });
const change = (from: string, to: string): string => {
  if (!sound.includes(from)) throw new Error(`The text has no "${from}".`);
  return sound.replace(from, () => to);
};
const found = (text: string) => check(text).problems.map(({ code }) => code);

describe('the check', () => {
  it('finds a sound template in order and tells how its keys lie', () => {
    const report = check(sound);
    expect(report).toMatchObject({ template: 'sound-motor', ok: true, draws, problems: [], redraws: { mean: 0, max: 0 } });
    const { min = 0, p05 = 0, median = 0, p95 = 0, max = 0 } = report.parts.a ?? {};
    // V - Ia Ra lies between 220 - 60 x 0.5 = 190 and 260 - 40 x 0.3 = 248, its middle near 240 - 50 x 0.4 = 220.
    expect([min >= 190, min < p05, p05 < median, median < p95, p95 < max, max <= 248]).toEqual(Array(6).fill(true));
    expect(Math.abs(median - 220)).toBeLessThan(3);
    expect(report.bins.a?.reduce((sum, { count }) => sum + count, 0)).toBe(draws);
  });

  it.each([
    ['not-finite', change('key: V - Ia * Ra', 'key: V - Ia * Ra / (Ia / Ia - 1)'), 1],
    ['not-finite', change('key: V - Ia * Ra', 'key: V - Ia * Ra * i'), 1],
    ['absurd', change('marks: 2', 'marks: 2\n    limits: [0, 200]'), null],
    ['requirement-never', change('stem:', 'require: [V > 200, V > 300]\nstem:'), 1],
    ['redraws', change('stem:', 'require: [V > 245]\nstem:'), null],
    ['few-distinct', change('range: [220, 260], step: 1', 'choose: [230]').replace('range: [0.3, 0.5], step: 0.01', 'choose: [0.4]'), null],
    ['copied', change('range: [220, 260], step: 1', 'choose: [230]').replace('range: [0.3, 0.5], step: 0.01', 'choose: [0.4]').replace('range: [40, 60], step: 1', 'range: [40, 50], step: 1'), null],
    ['misstep-accepted', change('key: V + Ia * Ra', 'key: V - 1.02 * Ia * Ra'), 1],
    ['window', change('key: V + Ia * Ra', 'key: V - 1.1 * Ia * Ra'), null],
    ['window', change('marks: 2', 'marks: 2\n    accept: { or: 0.01 V }'), null],
    ['window', change('unit: V\n    marks: 2\n    figures: 4', 'unit: V\n    marks: 2\n    accept: exact\n    figures: 2'), null],
    ['sign-change', change('key: V - Ia * Ra', 'key: V - 240 + Ia * Ra * 0'), null],
    ['example', change('solution:', 'examples:\n  - { source: A book of motors, obtained: read, given: { V: 240, Ra: 0.4, Ia: 50 }, expect: { a: 223 V }, within: 0.5 percent }\nsolution:'), 1],
  ])('finds %s', (code, text, share) => {
    const report = check(text);
    const problem = report.problems.find((one) => one.code === code);
    expect(report.ok).toBe(false);
    expect(problem).toBeDefined();
    if (share !== null) expect(problem?.share).toBe(share);
    expect(problem?.seeds.every((seed) => /^check-\d+$/.test(seed))).toBe(true);
  });

  it('reproduces a published figure, in another unit too', () => {
    // 240 - 50 x 0.4 = 220 V
    expect(found(change('solution:', 'examples:\n  - { source: A book of motors, obtained: read, given: { V: 240, Ra: 0.4, Ia: 50 }, expect: { a: 0.22 kV }, within: 0.1 percent }\nsolution:'))).toEqual([]);
  });

  it('lets a misstep lie within tolerance where an earlier part marks that step', () => {
    const separated = change('parts:\n', `parts:
  - part: drop
    kind: number
    ask: Find the drop.
    key: Ia * Ra
    unit: V
    marks: 1
`).replace('key: V + Ia * Ra, says: the drop is added', 'key: V - 1.02 * part.drop, says: drop at another current, separated-by: drop').replace('key: V - Ia * Ra', 'key: V - part.drop');
    expect(found(separated)).toEqual([]);
  });

  it('lets a key of both signs be where it is declared', () => {
    const both = change('key: V - Ia * Ra', 'key: V - 240 + Ia * Ra * 0').replace('marks: 2', 'marks: 2\n    accept: { or: 1 V }\n    sign: either');
    expect(found(both)).not.toContain('sign-change');
  });

  it('takes a reason for what is right here, and keeps it in sight', () => {
    const few = change('range: [220, 260], step: 1', 'choose: [230]').replace('range: [0.3, 0.5], step: 0.01', 'choose: [0.4]').replace('stem:', 'reasons: { few-distinct: one machine of the shop, copied: the same }\nstem:');
    const report = check(few);
    expect(report.problems).toEqual([]);
    expect(report.excused.map(({ code }) => code)).toContain('few-distinct');
  });

  it('finds options that are close, and not exactly one right', () => {
    const choice = (missteps: string) => change('kind: number', 'kind: choice\n    options: computed').replace(/ {4}missteps:\n.*\n/, `    missteps: [${missteps}]\n`);
    expect(found(choice('{ key: V + Ia * Ra, says: added }'))).toEqual([]);
    expect(found(choice('{ key: V + Ia * Ra, says: added }, { key: V + 1.02 * Ia * Ra, says: nearly }'))).toContain('options-close');
    const listed = sound.slice(0, sound.indexOf('parts:')) + `parts:
  - { part: a, kind: choice, ask: Which, marks: 1, options: [{ text: high, right: V > 240 }, { text: low, right: V < 240 }] }
  - { part: b, kind: number, ask: Find it., key: V - Ia * Ra, unit: V, marks: 1, figures: 4 }
solution: "{{part.b}}"
`;
    expect(found(listed)).toEqual(['right-count']);
    expect(found(listed.replace('V < 240', 'V <= 240'))).toEqual([]);
  });

  it('finds a printed derived value that is a key', () => {
    const leak = change('stem:', 'derive: { E: { key: V - Ia * Ra, unit: V, decimals: 1, label: Back-EMF } }\nstem:');
    expect(found(leak)).toEqual(['placeholder']);
  });

  it('shows its progress in steps, and stops when asked', () => {
    const steps = [...checkInSteps(templateOf(sound), 120)].map(({ done }) => done);
    expect(steps).toEqual([50, 100, 120]);
    const stop = new AbortController();
    expect(() => checkTemplate(templateOf(sound), { draws: 200, signal: stop.signal, onProgress: ({ done }) => done >= 100 && stop.abort() })).toThrow();
  });
});
