import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { parseTemplate } from '@/lib/templates/parse';
import { fixedMotor, library, problemsOf, templateOf } from '../../support/templates';

const change = (from: string, to: string): string => {
  if (!fixedMotor.includes(from)) throw new Error(`The text has no "${from}".`);
  return fixedMotor.replace(from, to);
};
const lineOf = (text: string, part: string): number => text.slice(0, text.indexOf(part)).split('\n').length;
const codes = (text: string): string[] => problemsOf(text).map(({ code }) => code);

describe('reading a template', () => {
  it('takes the fixed motor', () => {
    expect(problemsOf(fixedMotor)).toEqual([]);
    expect(templateOf(fixedMotor).plan.parts.map(({ part, uses }) => [part, uses])).toEqual([['a', []], ['b', ['a']], ['c', ['a', 'b']]]);
  });

  it.each([
    ['an alias', change('IL: { label: Line current', 'I2: &x { label: L, unit: A, choose: [1] }\n  IL: { label: Line current'), 'schema'],
    ['a tag', change('minutes: 5', 'minutes: !!int 5'), 'schema'],
    ['a custom tag', change('minutes: 5', 'minutes: !five 5'), 'schema'],
    ['__proto__', change('minutes: 5', 'minutes: 5\n__proto__: { x: 1 }'), 'schema'],
    ['a name that stands twice', change('minutes: 5', 'minutes: 5\nminutes: 6'), 'schema'],
    ['a directive', `%TAG ! x\n---\n${fixedMotor}`, 'schema'],
    ['more than 64 kB', `${fixedMotor}# ${'x'.repeat(64 * 1024)}`, 'schema'],
    ['an unknown word', change('minutes: 5', 'minutes: 5\nhints: none'), 'schema'],
    ['another language', change('language: 1', 'language: 2'), 'schema'],
    ['an unknown area', change('area: motors', 'area: rockets'), 'schema'],
    ['an unknown caution', change('minutes: 5', 'minutes: 5\ncautions: [cold]'), 'schema'],
    ['an area that demands a caution', change('area: motors', 'area: live'), 'caution-missing'],
    ['an unknown unit', change('unit: ohm, choose: [0.4]', 'unit: furlong, choose: [0.4]'), 'schema'],
    ['a given without a unit', change('label: Supply voltage, unit: V', 'label: Supply voltage'), 'schema'],
    ['two ways to draw', change('choose: [50]', 'choose: [50], range: [1, 2], step: 1'), 'schema'],
    ['a range without a step', change('choose: [50]', 'range: [1, 2]'), 'schema'],
    ['a range upside down', change('choose: [50]', 'range: [9, 2], step: 1'), 'schema'],
    ['a machine', change('stem:', 'machine: { kind: shunt }\nstem:'), 'schema'],
    ['a later kind', change('kind: number', 'kind: wiring'), 'schema'],
    ['an unknown name', change('IL - V / Rf', 'IL - V / Rff'), 'name'],
    ['a later part', change('IL - V / Rf', 'IL - part.b / Rf'), 'name'],
    ['implicit multiplication', change('V - part.a * Ra', 'V - 2 part.a'), 'name'],
    ['a forbidden function', change('IL - V / Rf', 'evaluate("1")'), 'name'],
    ['a reserved name', change('Ra: {', 'pi: {'), 'name'],
    ['a wrong dimension', change('key: V - part.a * Ra', 'key: part.a * Ra * Ra'), 'dimension'],
    ['factors that do not cancel', change('unit: W', 'unit: kW'), 'dimension'],
    ['a placeholder of nothing', change('from {{V}}', 'from {{VV}}'), 'placeholder'],
    ['a key printed in the stem', change('from {{V}}', 'from {{part.a}}'), 'placeholder'],
    ['an undeclared derived value printed', change('stem: |', 'derive: { If: V / Rf }\nstem: |').replace('from {{V}}', 'from {{If}}'), 'placeholder'],
    ['a stem too long', change('from {{V}}.', `from {{V}}. ${'long '.repeat(500)}`), 'length'],
    ['a label too long', change('Supply voltage', 'Supply voltage '.repeat(5)), 'length'],
    ['a formula that cannot be set', change('$I_a =', '$\\frac{I_a ='), 'schema'],
    ['a misstep separated by no earlier part', change('says: field current added', 'says: field current added, separated-by: b'), 'name'],
    ['a misstep that earns more than the part', change('earns: 1', 'earns: 3'), 'schema'],
    ['an accept in another dimension', change('or: 0.1 A', 'or: 0.1 V'), 'schema'],
    ['limits upside down', change('[0, 11500]', '[11500, 0]'), 'schema'],
    ['parts of one name', change('part: b', 'part: a'), 'schema'],
  ])('refuses %s', (_, text, code) => {
    expect(codes(text)).toContain(code);
    for (const problem of problemsOf(text)) expect(problem.says.length).toBeGreaterThan(8);
  });

  it('names line and column of the fault', () => {
    const text = change('key: V - part.a * Ra', 'key: V - part.a * Rq');
    const [problem] = problemsOf(text);
    expect(problem).toMatchObject({ code: 'name', part: 'b', line: lineOf(text, 'V - part.a * Rq'), column: 10 + 'V - part.a * '.length });
    expect(problem?.says).toContain('Rq');
    const [schema] = problemsOf(change('marks: 2', 'marks: two'));
    expect(schema).toMatchObject({ code: 'schema', part: 'b', line: lineOf(fixedMotor, 'marks: 2') });
  });

  it('finds all faults at once, each once', () => {
    const text = change('IL - V / Rf', 'IL - V / Rx').replace('from {{V}}', 'from {{VV}}').replace('unit: W', 'unit: parsec');
    expect(codes(text).sort()).toEqual(['name', 'placeholder', 'schema']);
  });

  it('never throws on a text that is no template', () => {
    for (const text of ['', '- a', '42', 'a: [', '"', '\u0000', 'template: x', 'parts: 3', 'given: { a: 1 }\nparts: [1, null]', `${'['.repeat(3000)}`])
      expect(parseTemplate(text, library).ok).toBe(false);
  });
});

describe('reading any text', () => {
  it('gives a template or problems with their places, and never throws', () => {
    const lines = fixedMotor.split('\n');
    const bad = fc.constantFrom('', '- x', 'key: 1/0', '  unit: none', 'choose: []', '    key: part.a', '"', '{', 'limits: [1, 2]', 'marks: -1', 'range: [0, 1e9]\n    step: 1e-9', '\t', 'null', 'given: null', 'part: c');
    fc.assert(fc.property(fc.nat(lines.length - 1), fc.nat(3), bad, fc.boolean(), (at, without, text, indented) => {
      const changed = [...lines.slice(0, at), ...(indented ? [`${/^ */.exec(lines[at] ?? '')?.[0] ?? ''}${text}`] : [text]), ...lines.slice(at + without)].join('\n');
      const parsed = parseTemplate(changed, library);
      if (parsed.ok) return;
      expect(parsed.problems.length).toBeGreaterThan(0);
      for (const { line = 1, column = 1 } of parsed.problems) expect(line >= 1 && column >= 1 && line <= changed.split('\n').length + 1).toBe(true);
    }), { numRuns: 400 });
  });
});

describe('a plate from a table', () => {
  const plate = (where: string) => fixedMotor
    .replace('given:\n', `plate: { table: shop, where: "${where}" }\ngiven:\n  P: { label: Output, column: P }\n`)
    .replace('unit: V, choose: [230]', 'column: V').replace('unit: ohm, choose: [0.4]', 'unit: ohm, column: Ra');
  const rowsOf = (where: string) => templateOf(plate(where)).plan.table?.rows.map(([power]) => power);

  it('keeps the rows that fit, by given or by column', () => {
    expect(rowsOf('P <= 50')).toEqual([2.2, 5.5, 11]);
    expect(rowsOf("wound == 'lap' and V < 300")).toEqual([2.2]);
    expect(codes(plate('P > 500'))).toEqual(['schema']);
    expect(codes(plate('Q > 5'))).toEqual(['name']);
  });

  it('refuses an unknown table, an unknown column, a unit that is not the column’s, and a column without a table', () => {
    expect(codes(plate('P <= 50').replace('table: shop', 'table: moon'))).toContain('schema');
    expect(codes(plate('P <= 50').replace('column: Ra', 'column: Rz'))).toContain('schema');
    expect(codes(plate('P <= 50').replace('column: P }', 'unit: W, column: P }'))).toContain('schema');
    expect(codes(fixedMotor.replace('choose: [50]', 'column: I'))).toContain('schema');
  });
});
