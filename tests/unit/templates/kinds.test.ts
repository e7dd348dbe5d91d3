import { describe, expect, it } from 'vitest';
import { markQuestion } from '@/lib/marking/mark';
import { blocksOf } from '@/lib/templates/blocks';
import { checkTemplate } from '@/lib/templates/check';
import { blocksText } from '@/lib/templates/plain';
import { toQuestion } from '@/lib/templates/question';
import { drawOf, templateOf } from '../../support/templates';

/** A coil on 100 V, 6 ohm and 8 ohm: I = 100 / (6 + j8) = 6 - j8 A, 10 A at -53.13 degrees. */
const coil = (more = '') => `template: coil
language: 1
title: A coil
area: motors
level: 3
minutes: 4
given:
  V: { label: Voltage, unit: V, choose: [100] }
  R: { label: Resistance, unit: ohm, choose: [6] }
  X: { label: Reactance, unit: ohm, choose: [8] }
stem: A coil on {{V}}.
parts:
  - part: a
    kind: number
    ask: Find the current as a phasor.
    key: V / (R + i * X)
    unit: A
    marks: 2
    form: complex${more}
  - part: b
    kind: number
    ask: Find the angle of the impedance.
    key: atand(X / R)
    unit: deg
    marks: 1
  - part: c
    kind: number
    ask: Find the power factor in percent.
    key: 100 * cosd(part.b)
    unit: percent
    ratio: true
    marks: 1
  - part: d
    kind: number
    ask: How many coils are there?
    key: ceil(X / R)
    unit: none
    decimals: 0
    marks: 1
solution: "{{part.a}}, $\\\\varphi = {{part.b}}$"
`;

describe('numbers of other kinds', () => {
  const template = templateOf(coil());
  const draw = drawOf(template);
  const verdicts = (answers: Record<string, string>) => markQuestion(template, draw, answers).parts.map(({ verdict }) => verdict);

  it('takes a phasor in polar and in rectangular form', () => {
    expect(draw.parts[0]?.key).toEqual({ value: { re: 6, im: -8 }, text: expect.stringMatching(/6\.00 − j8\.00\u00a0A \(10\.0∠−53\.1°\u00a0A\)/) as string });
    for (const answer of ['10∠−53.1° A', '10.05 ∠ -53.5° A', '6 - j8 A', '6−j8', '0.01∠-53.13° kA']) expect([answer, verdicts({ a: answer })[0]]).toEqual([answer, 'correct']);
    for (const answer of ['10∠53.1° A', '10∠−54° A', '10.2∠−53.1° A', '10 A']) expect([answer, verdicts({ a: answer })[0]]).toEqual([answer, 'wrong']);
    expect(verdicts({ a: '10∠−53.1° mA' })[0]).toBe('misstep');
    expect(toQuestion(template, draw).parts[0]?.form).toBe('complex');
  });

  it('holds an angle to half a degree, a percentage to 0.2 points, a count exactly', () => {
    expect(verdicts({ b: '53.6°', c: '60.2 %', d: '2' })).toEqual(['blank', 'correct', 'correct', 'correct']);
    expect(verdicts({ b: '53.7°', d: '2.01' })).toEqual(['blank', 'wrong', 'blank', 'wrong']);
    expect(verdicts({ c: '60.3 %' })[2]).toBe('wrong');
  });

  it('takes a ratio for a percentage only where the part allows it', () => {
    expect(verdicts({ c: '0.6' })[2]).toBe('correct');
    const strict = templateOf(coil().replace('    ratio: true\n', ''));
    expect(markQuestion(strict, drawOf(strict), { c: '0.6' }).parts[2]?.verdict).toBe('wrong');
  });

  it('calls a complex key of a real part a problem', () => {
    const real = templateOf(coil().replace('    form: complex\n', ''));
    expect(checkTemplate(real, { draws: 20 }).problems.find(({ part }) => part === 'a')?.code).toBe('not-finite');
  });
});

describe('plain text', () => {
  const text = (markdown: string) => blocksText(blocksOf(markdown, (name) => ({ text: `<${name}>`, tex: `\\mathrm{${name}}` })));

  it('writes formulas on one line', () => {
    expect(text('Find $E = V - I_a R_a$ with {{V}}.')).toBe('Find E = V − I_a R_a with <V>.');
    expect(text('$$\\frac{V - E}{R_a} = \\frac{ {{V}} }{\\sqrt{3} \\times 2\\ \\Omega}$$')).toBe('(V − E)/R_a = V/(√3 × 2 Ω)');
    expect(text('$\\varphi^2 \\approx 53.1^\\circ$')).toBe('φ² ≈ 53.1°');
  });

  it('keeps lists and tables apart', () => {
    expect(text('1. one\n2. two')).toBe('1. one\n2. two');
    expect(text('| a | b |\n| --- | --- |\n| 1 | {{V}} |')).toBe('a  |  b\n1  |  <V>');
  });

  it('ends on any text', () => {
    for (const tex of ['{', '}', '\\', '\\frac', '^', '_', '\\frac{1', '}}}{{{']) expect(typeof text(`$${tex}$`)).toBe('string');
  });
});
