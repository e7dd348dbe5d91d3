import { createHash } from 'node:crypto';
import { canonical } from '@/lib/audit/model';
import { notationOf } from '@/lib/numeric/notation';
import { printNumber } from '@/lib/numeric/printer';
import { findUnit } from '@/lib/numeric/units';
import { checkInSteps, type CheckReport } from '@/lib/templates/check';
import { type Draw, drawTemplate, engine } from '@/lib/templates/draw';
import type { DrawnPart } from '@/lib/templates/kinds/kind';
import type { Library } from '@/lib/templates/library';
import { type Parsed, parseTemplate } from '@/lib/templates/parse';
import { marksOf, type Template } from '@/lib/templates/plan';
import { matches } from '@/lib/templates/tolerance';
import { toQuestion } from '@/lib/templates/question';
import { solutionHtml } from '@/lib/templates/solution';
import { libraryDigests } from './library';
import type { TemplateFacts } from './model';
import type { Answers, Digests, DrawShown, ExampleShown, MisstepShare, PartShown, Preview, Reading } from './sandbox-tasks';

const sha256 = (text: string): string => createHash('sha256').update(text).digest('hex');

function factsIn(template: Template): TemplateFacts {
  const { head, plan } = template;
  const { template: slug, title, area, level, minutes, cautions } = head;
  return { slug, title, area, level, minutes, cautions, marks: marksOf(template), kinds: plan.parts.map(({ kind }) => kind) };
}

/** What a text rests on: itself, the engine, and the rows of the library it names. */
function digestsOf(text: string, parsed: Parsed, library: Library): Digests {
  const digests: Digests = { text: sha256(text), engine };
  if (!parsed.ok) return digests;
  const { head } = parsed.template;
  const names = [`area:${head.area}`, ...head.cautions.map((caution) => `caution:${caution}`), ...(head.plate ? [`table:${head.plate.table}`] : [])];
  const all = libraryDigests(library);
  for (const name of names) digests[name] = all[name] ?? '';
  return digests;
}

export function read(text: string, library: Library): { parsed: Parsed; reading: Reading } {
  const parsed = parseTemplate(text, library);
  const digests = digestsOf(text, parsed, library);
  const facts = parsed.ok ? factsIn(parsed.template) : null;
  return { parsed, reading: { facts, problems: parsed.ok ? [] : parsed.problems, digests, digest: sha256(canonical(digests)) } };
}

const acceptsText = ({ kind, unit, accept }: DrawnPart, locale: string): string => {
  if (kind !== 'number') return '';
  if (accept.tolerance === 0) return 'exactly';
  const shown = printNumber(accept.tolerance, { figures: 2 }, notationOf(locale));
  const named = unit === undefined ? null : findUnit(unit);
  return `± ${shown}${named?.symbol ? ` ${named.symbol}` : ''}${accept.angle === undefined ? '' : `, ± ${accept.angle}°`}`;
};

const partShown = (part: DrawnPart, locale: string): PartShown => ({
  part: part.part,
  kind: part.kind,
  marks: part.marks,
  key: part.key.text,
  accepts: acceptsText(part, locale),
  options: (part.options ?? []).map(({ option, right, says = '' }) => ({ option, right, says })),
  missteps: part.missteps.map(({ says, text, earns, separatedBy }) => ({ says, value: text, earns, ...(separatedBy === undefined ? {} : { separatedBy }) })),
});

const drawShown = (template: Template, draw: Draw): DrawShown => ({
  seed: draw.seed,
  redraws: draw.redraws,
  question: toQuestion(template, draw),
  parts: draw.parts.map((part) => partShown(part, draw.locale)),
  solutionHtml: solutionHtml(template, draw),
});

/** A text read, and one draw of it where it parses. */
export function preview(text: string, seed: string, locale: string, library: Library): Preview {
  const { parsed, reading } = read(text, library);
  if (!parsed.ok) return { ...reading, draw: null, refused: '' };
  const draw = drawTemplate(parsed.template, seed, { locale });
  return draw.ok ? { ...reading, draw: drawShown(parsed.template, draw.value), refused: '' } : { ...reading, draw: null, refused: draw.says };
}

/** Counts over many draws how often each misstep lies within the tolerance. */
class MisstepCount {
  private readonly rows = new Map<string, MisstepShare & { count: number }>();
  private draws = 0;

  constructor(private readonly template: Template) {}

  look(seed: string): void {
    const draw = drawTemplate(this.template, seed);
    this.draws += 1;
    if (draw.ok) for (const part of draw.value.parts) if (part.kind === 'number') this.lookAt(part);
  }

  private lookAt({ part, key, accept, missteps }: DrawnPart): void {
    missteps.forEach(({ value, says, separatedBy }, place) => {
      const id = `${part}:${place}`;
      const row = this.rows.get(id) ?? { part, says, share: 0, ...(separatedBy === undefined ? {} : { separatedBy }), count: 0 };
      if (value !== null && typeof key.value !== 'string' && matches(value, key.value, accept)) row.count += 1;
      this.rows.set(id, row);
    });
  }

  shares(): MisstepShare[] {
    return [...this.rows.values()].map(({ count, ...row }) => ({ ...row, share: this.draws === 0 ? 0 : count / this.draws }));
  }
}

const examplesIn = ({ head }: Template, report: CheckReport): ExampleShown[] =>
  head.examples.map(({ source, obtained, expect }) => ({
    source,
    obtained,
    figures: Object.entries(expect).map(([part, figure]) => `${part}: ${figure}`).join(', '),
    reproduced: !report.problems.some(({ code, says }) => code === 'example' && says.startsWith(`The example of ${source} is`)),
  }));

const unitsIn = ({ plan }: Template): Record<string, string> => Object.fromEntries(plan.parts.map(({ part, unit }) => [part, unit?.symbol ?? '']));

/** A text read and checked over `draws` draws; `onProgress` hears how many are done. */
export function check(text: string, draws: number, library: Library, onProgress: (done: number) => void): Answers['check'] {
  const { parsed, reading } = read(text, library);
  if (!parsed.ok) return { ...reading, report: null };
  const { template } = parsed;
  const missteps = new MisstepCount(template);
  const steps = checkInSteps(template, draws);
  let done = 0;
  for (;;) {
    const step = steps.next();
    if (step.done) {
      const extras = { missteps: missteps.shares(), examples: examplesIn(template, step.value), units: unitsIn(template) };
      return { ...reading, report: { ...step.value, ...extras } };
    }
    for (; done < step.value.done; done += 1) missteps.look(`check-${done}`);
    onProgress(done);
  }
}
