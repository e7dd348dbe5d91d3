import { z } from 'zod';
import { buildGiven, buildTable } from './build-givens';
import { Formulas } from './build-formulas';
import { checkTexts } from './build-texts';
import { Complaints } from './complaints';
import { PartBuild } from './build-part';
import { buildPart, kindNames, partText } from './kinds/registry';
import type { PartPlan } from './kinds/kind';
import type { Library } from './library';
import { templateHead } from './model';
import { brand, type GivenPlan, type Template } from './plan';
import type { Problem } from './problem';
import { readYaml } from './yaml';

const templateText = z.strictObject({ ...templateHead, parts: z.array(partText).min(1).max(12) });
export type TemplateText = z.output<typeof templateText>;

export type Parsed = { ok: true; template: Template } | { ok: false; problems: Problem[] };

const isRecord = (value: unknown): value is Record<string, unknown> => typeof value === 'object' && value !== null && !Array.isArray(value);

/** Words of the language that this version reserves but does not read. */
const complainOfReserved = (value: Record<string, unknown>, complaints: Complaints): boolean => {
  const before = complaints.problems.length;
  for (const word of ['machine', 'points'])
    if (word in value) complaints.add('schema', `"${word}:" describes a simulated machine, which this version does not read: write the formulas out in derive and key.`, [word]);
  const parts: unknown[] = Array.isArray(value.parts) ? value.parts : [];
  parts.forEach((part, index) => {
    if (!isRecord(part) || typeof part.kind !== 'string' || kindNames.includes(part.kind)) return;
    complaints.add('schema', `There is no kind "${part.kind}"; this version has ${kindNames.join(' and ')}.`, ['parts', index, 'kind']);
  });
  return complaints.problems.length > before;
};

const complainOfLibrary = ({ area, cautions, conventions }: TemplateText, library: Library, complaints: Complaints): void => {
  const row = Object.hasOwn(library.areas, area) ? library.areas[area] : undefined;
  if (row === undefined) complaints.add('schema', `There is no area "${area}"; there are ${Object.keys(library.areas).join(', ')}.`, ['area']);
  cautions.forEach((caution, index) => {
    if (!Object.hasOwn(library.cautions, caution))
      complaints.add('schema', `There is no caution "${caution}"; there are ${Object.keys(library.cautions).join(', ')}.`, ['cautions', index]);
  });
  if (row?.caution === 'required' && cautions.length === 0)
    complaints.add('caution-missing', `Area ${area} demands a caution: name at least one in cautions.`, ['area']);
  if (new Set(conventions).size < conventions.length) complaints.add('schema', 'A convention stands twice.', ['conventions']);
};

const complainOfTwins = (text: TemplateText, complaints: Complaints): void => {
  for (const name of Object.keys(text.derive))
    if (Object.hasOwn(text.given, name)) complaints.add('name', `${name} is a given already: call the derived value something else.`, ['derive', name]);
  text.parts.forEach(({ part }, index) => {
    if (text.parts.findIndex((other) => other.part === part) < index) complaints.add('schema', `Part ${part} stands twice.`, ['parts', index, 'part']);
  });
};

/** Makes everything ready that a draw evaluates; the parts in order, so that a key may use earlier ones only. */
const buildPlan = (text: TemplateText, library: Library, complaints: Complaints): Template['plan'] => {
  const table = buildTable(text, library, complaints);
  const givens = Object.entries(text.given)
    .map(([name, given]) => buildGiven(name, given, table?.table ?? null, complaints))
    .filter((given): given is GivenPlan => given !== null);
  const formulas = new Formulas(text, givens, complaints);
  const derived = formulas.buildDerived();
  const requirements = formulas.buildRequirements();
  const parts: PartPlan[] = [];
  text.parts.forEach((part, index) => {
    const plan = buildPart(part, new PartBuild(index, parts, formulas, complaints));
    if (plan !== null) parts.push(plan);
  });
  if (table !== null && !givens.some(({ from }) => 'column' in from))
    complaints.add('schema', 'The plate names a table, but no given reads a column of it.', ['plate']);
  return { table: table?.plan ?? null, givens, derived, requirements, parts };
};

const complainOfExamples = (text: TemplateText, complaints: Complaints): void => {
  text.examples.forEach(({ given, expect }, index) => {
    const missing = Object.keys(text.given).filter((name) => !Object.hasOwn(given, name));
    if (missing.length > 0) complaints.add('example', `The example gives no value for ${missing.join(', ')}.`, ['examples', index, 'given']);
    for (const name of Object.keys(given))
      if (!Object.hasOwn(text.given, name)) complaints.add('example', `The example gives ${name}, which is no given here.`, ['examples', index, 'given', name]);
    for (const part of Object.keys(expect))
      if (!text.parts.some((one) => one.part === part)) complaints.add('example', `The example expects part ${part}, which is not there.`, ['examples', index, 'expect', part]);
    if (Object.keys(expect).length === 0) complaints.add('example', 'The example expects nothing.', ['examples', index, 'expect']);
  });
};

/**
 * The one door from text to a template. Reads template language 1: YAML, form, names, dimensions, placeholders; every
 * problem names its place. What only shows in draws is the work of `checkTemplate`.
 */
export function parseTemplate(text: string, library: Library): Parsed {
  const read = readYaml(text);
  if (!read.ok) return read;
  const { value } = read.yaml;
  const rawParts: unknown[] = isRecord(value) && Array.isArray(value.parts) ? value.parts : [];
  const complaints = new Complaints(read.yaml, (index) => {
    const part = rawParts[index];
    return isRecord(part) && typeof part.part === 'string' ? part.part : undefined;
  });
  const failed = (): Parsed => ({ ok: false, problems: complaints.problems });
  if (isRecord(value) && complainOfReserved(value, complaints)) return failed();
  const checked = templateText.safeParse(value, { reportInput: true });
  if (!checked.success) {
    complaints.addIssues(checked.error.issues);
    return failed();
  }
  const { parts: _, ...head } = checked.data;
  complainOfLibrary(checked.data, library, complaints);
  complainOfTwins(checked.data, complaints);
  const plan = buildPlan(checked.data, library, complaints);
  checkTexts(checked.data, complaints);
  complainOfExamples(checked.data, complaints);
  const area = library.areas[head.area];
  if (complaints.problems.length > 0 || area === undefined) return failed();
  const cautions = head.cautions.flatMap((caution) => library.cautions[caution] ?? []);
  return { ok: true, template: brand({ source: text, head, area, cautions, plan }) };
}
