import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { streamOf } from '@/lib/numeric/stream';
import { drawTemplate } from '@/lib/templates/draw';
import { toQuestion } from '@/lib/templates/question';
import { solutionHtml } from '@/lib/templates/solution';
import { drawOf, fixedMotor, templateOf } from '../../support/templates';

const ranged = (range: string) => templateOf(fixedMotor
  .replace('choose: [0.4]', 'range: [0.15, 0.45], step: 0.01').replace('choose: [230] }\n  Ra', `${range} }\n  Ra`).replace('choose: [50]', 'range: [40, 60], step: 1'));
const motor = ranged('range: [200, 260], step: 10');
const seeds = fc.string({ minLength: 1, maxLength: 24 });

describe('drawing', () => {
  it('gives the same draw for the same seed, whatever was drawn before', () => {
    fc.assert(fc.property(seeds, seeds, (seed, other) => {
      const first = drawOf(motor, seed);
      drawOf(motor, other);
      expect(drawOf(ranged('range: [200, 260], step: 10'), seed)).toEqual(first);
    }), { numRuns: 40 });
  });

  it('moves no other given when one given’s range changes, nor when their order does', () => {
    const wider = ranged('range: [100, 900], step: 1');
    fc.assert(fc.property(seeds, (seed) => {
      const [before, after] = [drawOf(motor, seed).given, drawOf(wider, seed).given];
      for (const name of ['Ra', 'IL', 'Rf']) expect(after[name]).toEqual(before[name]);
    }), { numRuns: 60 });
  });

  it('takes the floor(r × count)-th value by the stream of the given’s own name', () => {
    fc.assert(fc.property(seeds, (seed) => {
      const { Ra, IL } = drawOf(motor, seed).given;
      expect(Ra?.value).toBe((15 + Math.floor(streamOf(seed, 'Ra', 0)() * 31)) / 100);
      expect(IL?.value).toBe(40 + Math.floor(streamOf(seed, 'IL', 0)() * 21));
    }), { numRuns: 60 });
  });

  it('prints exact decimals of the step, by the locale', () => {
    fc.assert(fc.property(seeds, (seed) => {
      expect(drawOf(motor, seed).given.Ra?.text).toMatch(/^0\.\d\d\u00a0Ω$/);
      expect(drawOf(motor, seed, 'de').given.Ra?.text).toMatch(/^0,\d\d\u00a0Ω$/);
      expect(drawOf(motor, seed, 'de').parts.map(({ key }) => key.value)).toEqual(drawOf(motor, seed).parts.map(({ key }) => key.value));
    }), { numRuns: 30 });
  });

  it('draws again until the requirements hold, and counts', () => {
    const strict = templateOf(fixedMotor.replace('choose: [50]', 'range: [40, 60], step: 1').replace('stem: |', 'require: [IL > 55]\nstem: |'));
    const redraws = Array.from({ length: 100 }, (_, seed) => drawOf(strict, `r-${seed}`)).map((draw) => {
      expect(draw.given.IL?.value).toBeGreaterThan(55);
      expect(draw.given.IL?.value).toBe(40 + Math.floor(streamOf(draw.seed, 'IL', draw.redraws)() * 21));
      return draw.redraws;
    });
    expect(Math.max(...redraws)).toBeGreaterThan(2);
  });

  it('gives up after 500 redraws and names the requirement that failed most', () => {
    const never = templateOf(fixedMotor.replace('stem: |', 'require: [IL > 1, IL > 55]\nstem: |'));
    expect(drawTemplate(never, 'x')).toMatchObject({ ok: false, code: 'requirement-never', says: expect.stringContaining('IL > 55') as string });
  });

  it('refuses a formula without a value', () => {
    const broken = templateOf(fixedMotor.replace('stem: |', 'derive: { x: "i * V" }\nrequire: [x > 1]\nstem: |'));
    expect(drawTemplate(broken, 'x')).toMatchObject({ ok: false, code: 'not-finite' });
  });

  it('rounds a declared derived value before it is used', () => {
    const declared = fixedMotor.replace('choose: [230] }\nstem', 'choose: [70] }\nderive:\n  If: { key: V / Rf, unit: A, decimals: 1, label: Field current }\nstem')
      .replace('key: IL - V / Rf', 'key: IL - If');
    const draw = drawOf(templateOf(declared)); // 230/70 = 3.2857…, printed and used as 3.3
    expect(draw.derived.If).toMatchObject({ value: 3.3, text: '3.3\u00a0A', unit: 'A' });
    expect(draw.parts[0]?.key.value).toBeCloseTo(46.7, 10);
    expect(toQuestion(templateOf(declared), draw).plate.map(({ label }) => label)).toContain('Field current');
  });

  it('draws a whole row of a table', () => {
    const plate = templateOf(fixedMotor.replace('given:\n', 'plate: { table: shop }\ngiven:\n').replace('unit: V, choose: [230]', 'column: V').replace('unit: ohm, choose: [0.4]', 'column: Ra'));
    const rows = new Set(Array.from({ length: 60 }, (_, seed) => drawOf(plate, `t-${seed}`).given).map(({ V, Ra }) => `${V?.text} ${Ra?.text}`));
    expect([...rows].sort()).toEqual(['240\u00a0V 0.60\u00a0Ω', '240\u00a0V 1.50\u00a0Ω', '500\u00a0V 0.05\u00a0Ω', '500\u00a0V 0.90\u00a0Ω']);
  });
});

describe('text', () => {
  const text = (stem: string, solution = 'Done.') => templateOf(fixedMotor.replace('A motor takes {{IL}} from {{V}}.', () => stem).replace('$I_a = {{part.a}}$, $E = {{part.b}}$, so {{part.c}}.', () => solution));

  it('lets no HTML, link or image through', () => {
    const template = text('<img src=x onerror=alert(1)> <b>{{V}}</b> [go](javascript:alert(1)) ![x](http://x/y) `code`');
    const { stemHtml } = toQuestion(template, drawOf(template));
    expect(stemHtml.match(/<[^>]+>/g)).toEqual(['<p>', '<span class="drawn">', '</span>', '</p>']);
  });

  it('lets no command of TeX reach beyond the formula', () => {
    const template = text('Take {{V}}.', 'See $\\href{javascript:alert(1)}{x}$ and $\\includegraphics{x}$.');
    expect(solutionHtml(template, drawOf(template))).not.toMatch(/href=|<img/);
  });

  it('prints drawn values in text and in formulas, also between braces of TeX', () => {
    const template = text('Take {{ V }} and *{{IL}}*.', '$$\\frac{{{V}}}{{{Ra}}}$$ | a | b |');
    expect(toQuestion(template, drawOf(template)).stemHtml).toBe('<p>Take <span class="drawn">230\u00a0V</span> and <em><span class="drawn">50\u00a0A</span></em>.</p>');
    const html = solutionHtml(template, drawOf(template));
    expect(html).toContain('katex-display');
    expect(html).toContain('<mn>230</mn>');
    expect(html).not.toContain('{{');
  });

  it('sets lists and tables', () => {
    const template = text('| Load | Current |\n  | --- | --- |\n  | full | {{IL}} |\n\n  1. Start\n  2. Stop');
    const { stemHtml } = toQuestion(template, drawOf(template));
    expect(stemHtml).toContain('<th scope="col">Load</th>');
    expect(stemHtml).toContain('<td><span class="drawn">50\u00a0A</span></td>');
    expect(stemHtml).toContain('<ol><li>Start</li><li>Stop</li></ol>');
  });
});
