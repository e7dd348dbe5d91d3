import { ExpressionError, type Value } from '@/lib/expressions/compile';
import { decimalsOf } from '@/lib/numeric/digits';
import { type Notation, notationOf } from '@/lib/numeric/notation';
import { printQuantity } from '@/lib/numeric/printer';
import { streamOf } from '@/lib/numeric/stream';
import { refuse, type Result } from '@/lib/result';
import type { DrawnPart } from './kinds/kind';
import type { DerivedPlan, GivenPlan, Template } from './plan';
import { fillText } from './print';
import type { Amount } from './tolerance';
import { addKeys, type DrawnValues, drawValues } from './values';

/** Release of the engine that drew; it stands on each paper. */
export const engine = 'fullfield-1';
export const defaultLocale = 'en';

export interface DrawnGiven { value: number | string; unit: string; text: string; decimals: number }
export interface DrawnDerived { value: Amount | string | boolean; unit?: string; text?: string }

/**
 * One draw of a template as plain data: it is stored whole, and marked from later. Keys are in it, so it never leaves
 * the server; `toQuestion` gives what a candidate may see.
 */
export interface Draw {
  template: string;
  seed: string;
  locale: string;
  redraws: number;
  engine: string;
  given: Record<string, DrawnGiven>;
  derived: Record<string, DrawnDerived>;
  parts: DrawnPart[];
}

const plain = (value: Value): Amount | string | boolean => (typeof value === 'object' ? { re: value.re, im: value.im } : value);

/** Decimals that a number is written with: 0.29 has two. */
const ownDecimals = (value: number): number => {
  const { digits, point } = decimalsOf(value);
  return Math.max(0, digits.length - point);
};

const drawnGiven = (given: GivenPlan, value: Value | undefined, chosen: number | undefined, notation: Notation): DrawnGiven => {
  if (typeof value !== 'number') return { value: String(value), unit: given.unit.code, text: String(value), decimals: 0 };
  const decimals = chosen ?? ('column' in given.from ? given.from.decimals : undefined) ?? ownDecimals(value);
  return { value, unit: given.unit.code, text: printQuantity(value, { decimals }, given.unit, notation), decimals };
};

const drawnDerived = ({ declared }: DerivedPlan, value: Value | undefined, notation: Notation): DrawnDerived => {
  const stored = plain(value ?? NaN);
  if (declared === null || typeof stored !== 'number' || !Number.isFinite(stored)) return { value: stored };
  return { value: stored, unit: declared.unit.code, text: printQuantity(stored, declared.precision, declared.unit, notation) };
};

/** Completes values already drawn to a whole draw: keys, options, printed texts. */
export function completeDraw(template: Template, seed: string, locale: string, { redraws, scope, decimals }: DrawnValues): Draw {
  const { plan, head } = template;
  const notation = notationOf(locale);
  addKeys(plan, scope);
  const draw: Draw = {
    template: head.template, seed, locale, redraws, engine,
    given: Object.fromEntries(plan.givens.map((given) => [given.name, drawnGiven(given, scope.values[given.name], decimals[given.name], notation)])),
    derived: Object.fromEntries(plan.derived.map((derived) => [derived.name, drawnDerived(derived, scope.values[derived.name], notation)])),
    parts: [],
  };
  for (const part of plan.parts)
    draw.parts.push(part.draw({ scope, notation, stream: (name) => streamOf(seed, name, redraws), fill: (text) => fillText(template, draw, text) }));
  return draw;
}

/**
 * Draws a template: same template and same seed give the same draw. `locale` (BCP 47) decides the decimal mark of printed
 * texts and changes no value. Refuses where no draw holds the requirements or a formula has no value.
 */
export function drawTemplate(template: Template, seed: string, { locale = defaultLocale }: { locale?: string } = {}): Result<Draw, 'requirement-never' | 'not-finite'> {
  try {
    const values = drawValues(template, seed);
    if (!values.ok) return refuse(values.code, values.says);
    return { ok: true, value: completeDraw(template, seed, locale, values.value) };
  } catch (error) {
    if (!(error instanceof ExpressionError)) throw error;
    return refuse('not-finite', `A formula has no value for seed ${seed}: ${error.message}`);
  }
}
