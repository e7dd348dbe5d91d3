import { notationOf } from '@/lib/numeric/notation';
import { quantityToTex } from '@/lib/numeric/printer';
import type { Draw } from './draw';
import { replacePlaceholders } from './placeholders';
import type { Template } from './plan';

/** A drawn value in print and as TeX. */
export interface Printed { text: string; tex: string }

const texText = (text: string): string => `\\text{${text.replace(/[\\{}$&#^_%~]/g, ' ')}}`;

const printGiven = (template: Template, draw: Draw, name: string): Printed | null => {
  const drawn = draw.given[name];
  const plan = template.plan.givens.find((given) => given.name === name);
  if (drawn === undefined || plan === undefined) return null;
  const { value, text, decimals } = drawn;
  return { text, tex: typeof value === 'number' ? quantityToTex(value, { decimals }, plan.unit, notationOf(draw.locale)) : texText(text) };
};

const printDerived = (template: Template, draw: Draw, name: string): Printed | null => {
  const drawn = draw.derived[name];
  const declared = template.plan.derived.find((derived) => derived.name === name)?.declared;
  if (drawn?.text === undefined || !declared || typeof drawn.value !== 'number') return null;
  return { text: drawn.text, tex: quantityToTex(drawn.value, declared.precision, declared.unit, notationOf(draw.locale)) };
};

const printPart = (template: Template, draw: Draw, id: string): Printed | null => {
  const drawn = draw.parts.find(({ part }) => part === id);
  const plan = template.plan.parts.find(({ part }) => part === id);
  if (drawn === undefined || plan === undefined) return null;
  return drawn.carries === undefined ? { text: drawn.key.text, tex: texText(drawn.key.text) } : plan.print(drawn.carries, notationOf(draw.locale));
};

/** Prints what a placeholder names: a given, a declared derived value, or a part's key. Null where nothing has that name. */
export function printNamed(template: Template, draw: Draw, name: string): Printed | null {
  if (name.startsWith('part.')) return printPart(template, draw, name.slice('part.'.length));
  return printGiven(template, draw, name) ?? printDerived(template, draw, name);
}

/** Pieces between dollar signs are TeX. */
const formula = /(\$\$[\s\S]+?\$\$|\$[^$]+\$)/;

/** Markdown with its placeholders filled: value and unit in text, TeX inside `$…$`. */
export function fillText(template: Template, draw: Draw, text: string): string {
  return text.split(formula).map((piece, index) => {
    const form = index % 2 === 1 ? 'tex' : 'text';
    return replacePlaceholders(piece, (name) => printNamed(template, draw, name)?.[form] ?? `{{${name}}}`);
  }).join('');
}
