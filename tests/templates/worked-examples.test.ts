import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { loadLibrary, templatesFolder } from '@/lib/bank/library';
import { checkExamples } from '@/lib/templates/examples';
import type { ExampleText } from '@/lib/templates/model';
import { parseTemplate } from '@/lib/templates/parse';
import type { Template } from '@/lib/templates/plan';

interface Figure { symbol: string; value: string; unit: string; corrected?: string }
interface Published { id: string; given: Record<string, string>; find: Figure[]; source: { author: string; section: string } }

const published = JSON.parse(readFileSync('tests/reference/worked-examples/dc-machines.json', 'utf8')) as Published[];
const library = loadLibrary();

const read = (file: string): Template => {
  const reading = parseTemplate(readFileSync(file, 'utf8'), library);
  if (!reading.ok) throw new Error(`${file}: ${reading.problems.map(({ says }) => says).join(' ')}`);
  return reading.template;
};
const templates = ['dc-motors', 'dc-generators'].flatMap((area) => {
  const folder = path.join(templatesFolder(), area);
  return readdirSync(folder).filter((file) => file.endsWith('.yaml')).map((file) => read(path.join(folder, file)));
});

/** The number of an example or problem with its page, as a source names it; chapters are named in words of their own. */
const placeOf = ({ source }: Published): string => source.section.split(', ').filter((piece) => !piece.startsWith('Ch.')).join(', ').toLowerCase();
const surnameOf = ({ source }: Published): string => (source.author.includes('OpenStax') ? 'OpenStax' : source.author.split(/ \(|,/)[0]?.split(' ').at(-1) ?? '');
const matching = ({ source }: ExampleText): Published[] =>
  published.filter((record) => source.includes(surnameOf(record)) && source.toLowerCase().includes(placeOf(record)));

const number = (text: string | number): number => Number.parseFloat(String(text));

/** Figures that a source states, with the two changes of form that a template makes: turns a second, a change in percent. */
const figuresOf = ({ given, find }: Published): number[] => [
  ...Object.values(given).map(number),
  ...find.flatMap(({ value, unit, corrected }) => {
    const figure = number(corrected ?? value);
    if (unit === 'rev/s') return [figure * 60];
    return unit === '%' && figure < 0 ? [100 + figure] : [figure];
  }),
];

describe('published worked examples', () => {
  const examples = templates.flatMap((template) => template.head.examples.map((example) => ({ template, example })));

  it('stand in at least fourteen templates', () => {
    expect(new Set(examples.map(({ template }) => template.head.template)).size).toBeGreaterThanOrEqual(14);
  });

  it.each(examples)('$template.head.template expects what $example.source prints', ({ example }) => {
    const records = matching(example);
    expect(records.length).toBeGreaterThan(0);
    const figures = records.flatMap(figuresOf);
    for (const [part, stated] of Object.entries(example.expect))
      expect(figures.some((figure) => Math.abs(figure - number(stated)) <= 1e-6 * Math.abs(figure)), `part ${part}: ${stated}`).toBe(true);
  });

  it.each(templates)('$head.template reproduces its examples', (template) => {
    expect(checkExamples(template).map(({ says }) => says)).toEqual([]);
  });
});
