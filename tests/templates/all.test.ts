import { readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { describe, expect, it } from 'vitest';
import { loadLibrary, templatesFolder } from '@/lib/bank/library';
import { markQuestion } from '@/lib/marking/mark';
import { formulasIn } from '@/lib/templates/blocks';
import { checkTemplate } from '@/lib/templates/check';
import { type Draw, drawTemplate } from '@/lib/templates/draw';
import { formulaTrouble } from '@/lib/templates/html';
import { parseTemplate } from '@/lib/templates/parse';
import type { Template } from '@/lib/templates/plan';
import { toQuestion } from '@/lib/templates/question';
import { solutionBlocks } from '@/lib/templates/solution';

const library = loadLibrary();
const files = readdirSync(templatesFolder(), { recursive: true, encoding: 'utf8' })
  .filter((file) => /\.ya?ml$/.test(file) && file.includes(path.sep) && !file.startsWith(`tables${path.sep}`));

const read = (file: string): Template => {
  const parsed = parseTemplate(readFileSync(path.join(templatesFolder(), file), 'utf8'), library);
  if (!parsed.ok) throw new Error(parsed.problems.map(({ line, says }) => `${file}:${line ?? 0} ${says}`).join('\n'));
  return parsed.template;
};
const drawOf = (template: Template, seed: string, locale = 'en'): Draw => {
  const drawn = drawTemplate(template, seed, { locale });
  if (!drawn.ok) throw new Error(drawn.says);
  return drawn.value;
};
/** The key of each part as a candidate would type or take it. */
const keysOf = (draw: Draw): Record<string, string> =>
  Object.fromEntries(draw.parts.map(({ part, key, options }) => [part, options === undefined ? key.text : String(key.value)]));

describe.each(files)('%s', (file) => {
  const template = read(file);

  it('is in order over 300 draws and reproduces its published examples', () => {
    const report = checkTemplate(template, { draws: 300 });
    expect(report.problems).toEqual([]);
    expect(report.draws).toBe(300);
    for (const example of template.head.examples) expect(example.source.length).toBeGreaterThan(10);
  });

  it('is called as its file and lies in the folder of its area', () => {
    expect(file).toBe(path.join(template.head.area, `${template.head.template}.yaml`));
  });

  it.each(['en', 'fr-CA'])('gives full marks to its own printed keys, and none to a blank (%s)', (locale) => {
    for (let index = 0; index < 20; index += 1) {
      const draw = drawOf(template, `own-${index}`, locale);
      const marked = markQuestion(template, draw, keysOf(draw));
      expect(marked.parts.map(({ verdict }) => verdict)).toEqual(draw.parts.map(() => 'correct'));
      expect(marked.awarded).toBe(marked.of);
      const blank = markQuestion(template, draw, {});
      expect(blank.parts.map(({ verdict, awarded }) => [verdict, awarded])).toEqual(draw.parts.map(() => ['blank', 0]));
    }
  });

  it('marks as well from a draw that was stored and read again', () => {
    const draw = drawOf(template, 'stored');
    const again: Draw = JSON.parse(JSON.stringify(draw)) as Draw;
    expect(again).toEqual(draw);
    expect(markQuestion(template, again, keysOf(draw))).toEqual(markQuestion(template, draw, keysOf(draw)));
  });

  it('shows a candidate no key, seed, title or misstep', () => {
    const draw = drawOf(template, 'sentinel-seed-4711');
    const question = toQuestion(template, draw);
    const seen = JSON.stringify(question);
    // Options are numbers that may be keys; everything else is searched for keys.
    const beside = JSON.stringify({ ...question, parts: question.parts.map((part) => ({ ...part, options: [] })) });
    for (const secret of ['sentinel-seed-4711', template.head.template, template.head.title]) expect(seen).not.toContain(secret);
    for (const { missteps, options, key } of draw.parts) {
      for (const { says } of missteps) expect(seen).not.toContain(says);
      for (const { says } of options ?? []) if (says !== undefined) expect(seen).not.toContain(says);
      if (options === undefined && key.text.length > 4) expect(beside).not.toContain(key.text);
    }
    expect(Object.keys(toQuestion(template, draw).parts[0] ?? {})).not.toContain('key');
  });

  it('sets every formula of its solution with drawn values', () => {
    const formulas = formulasIn(solutionBlocks(template, drawOf(template, 'set')));
    expect(formulas.map(({ tex }) => formulaTrouble(tex)).filter((trouble) => trouble !== null)).toEqual([]);
    expect(formulas.map(({ tex }) => tex).join('')).not.toContain('{{');
  });
});
