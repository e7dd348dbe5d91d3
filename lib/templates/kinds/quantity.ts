import { z } from 'zod';
import { type Expression, ExpressionError, type Value } from '@/lib/expressions/compile';
import { roundToFigures } from '@/lib/numeric/digits';
import type { Notation } from '@/lib/numeric/notation';
import { numberToTex, printPolar, printQuantity, printRectangular, quantityToTex } from '@/lib/numeric/printer';
import type { Unit } from '@/lib/numeric/units';
import { acceptText, type AcceptText, expressionText, longest, misstepText, type MisstepText } from '../model';
import { type Accept, allowanceOf, type Allowance, type Amount, type Asked, isFiniteAmount } from '../tolerance';
import type { Path } from '../yaml';
import type { Build, DrawnMisstep, Scope } from './kind';

/** Fields of a part whose key is a quantity: a number typed, or options computed. */
export const quantityText = {
  key: expressionText,
  unit: z.string(),
  figures: z.int().min(1).max(8).optional(),
  decimals: z.int().min(0).max(8).optional(),
  accept: acceptText.optional(),
  limits: z.tuple([z.number(), z.number()]).refine(([lo, hi]) => lo < hi, 'must be [low, high] with low below high').optional(),
  sign: z.literal('either', 'must be "either", for a key that may be above or below zero').optional(),
  missteps: z.array(misstepText).max(12).default([]),
  'trade-constant': z.string().trim().min(1).max(longest.says).optional(),
  form: z.enum(['real', 'complex']).default('real'),
};
export interface QuantityText {
  key: string;
  unit: string;
  figures?: number;
  decimals?: number;
  accept?: AcceptText;
  limits?: [number, number];
  sign?: 'either';
  missteps: MisstepText[];
  'trade-constant'?: string;
  form: 'real' | 'complex';
}

export interface MisstepPlan { key: Expression; says: string; earns: number; separatedBy?: string }

/** A quantity made ready: its formula, its unit, how it is printed, what is accepted and the known wrong ways to it. */
export interface Quantity {
  key: Expression;
  unit: Unit;
  asked: Asked;
  precision: { figures: number } | { decimals: number };
  accept: Accept | null;
  /** outside of these an answer or key is absurd [unit of the quantity] */
  limits: readonly [number, number];
  signed: boolean;
  missteps: MisstepPlan[];
}

/** Significant figures of an answer where a part states none. */
export const defaultFigures = 3;

const acceptOf = (text: AcceptText | undefined, unit: Unit, build: Build): Accept | null => {
  if (text === undefined) return null;
  if (text === 'exact') return { exact: true };
  const or = text.or === undefined ? undefined : build.amount(text.or, unit, ['accept', 'or']);
  const degree = text.angle === undefined ? null : build.unit('deg', ['accept', 'angle']);
  const angle = text.angle === undefined || degree === null ? undefined : build.amount(text.angle, degree, ['accept', 'angle']);
  return { exact: false, within: text.within, or: or ?? undefined, angle: angle ?? undefined };
};

/** Without limits of its own a resistance is absurd below zero; nothing else is known to be. */
const limitsOf = (text: QuantityText): readonly [number, number] =>
  text.limits ?? (text.unit === 'ohm' || text.unit === 'kohm' || text.unit === 'Mohm' ? [0, Infinity] : [-Infinity, Infinity]);

const misstepsOf = (texts: readonly MisstepText[], marks: number, build: Build): MisstepPlan[] =>
  texts.flatMap((text, index) => {
    const at = (field: string): Path => ['missteps', index, field];
    const key = build.expression(text.key, at('key'));
    const separatedBy = text['separated-by'];
    if (separatedBy !== undefined && !build.earlier(separatedBy))
      build.complain('name', `separated-by names part ${separatedBy}, which does not stand before this part.`, at('separated-by'));
    const earns = text.earns ?? 0;
    if (earns > marks) build.complain('schema', `The misstep earns ${earns} of ${marks} marks: lower it.`, at('earns'));
    return key === null ? [] : [{ key, says: text.says.replace(/\.$/, ''), earns, separatedBy }];
  });

/** Makes a quantity ready, or complains; null where its key or unit cannot be used. */
export function buildQuantity(text: QuantityText, marks: number, build: Build): Quantity | null {
  const key = build.expression(text.key, ['key']);
  const unit = build.unit(text.unit, ['unit']);
  if (text.figures !== undefined && text.decimals !== undefined) build.complain('schema', 'State figures or decimals, not both.', ['decimals']);
  if (key === null || unit === null) return null;
  build.dimension(key, unit, ['key'], text['trade-constant'] !== undefined);
  const figures = text.figures ?? defaultFigures;
  return {
    key,
    unit,
    asked: { unit, figures, complex: text.form === 'complex', whole: text.decimals === 0 && unit.code === 'none' },
    precision: text.decimals === undefined ? { figures } : { decimals: text.decimals },
    accept: acceptOf(text.accept, unit, build),
    limits: limitsOf(text),
    signed: text.sign === 'either' || (text.limits !== undefined && text.limits[0] < 0 && text.limits[1] > 0) || text.form === 'complex',
    missteps: misstepsOf(text.missteps, marks, build),
  };
}

/** A value as a plain amount; null where it is no quantity (text, true or false). */
export const amountOf = (value: Value): Amount | null => {
  if (typeof value === 'number') return value;
  return typeof value === 'object' ? { re: value.re, im: value.im } : null;
};

/** The formula's amount; null where it throws or gives no quantity. */
export const evaluateAmount = (expression: Expression, scope: Scope): Amount | null => {
  try {
    return amountOf(expression.evaluate(scope));
  } catch (error) {
    if (!(error instanceof ExpressionError)) throw error;
    return null;
  }
};

export const isAbsurd = (amount: Amount, [low, high]: readonly [number, number]): boolean =>
  typeof amount === 'number' && (amount < low || amount > high);

/** An amount rounded to so many significant figures, as a candidate writes it down. */
export const roundAmount = (amount: Amount, figures: number): Amount => {
  if (!isFiniteAmount(amount)) return amount;
  return typeof amount === 'number' ? roundToFigures(amount, figures) : { re: roundToFigures(amount.re, figures), im: roundToFigures(amount.im, figures) };
};

/** As roundAmount for any value: text, true and false stay as they are, a complex one is not rounded. */
export const roundValue = (value: Value, figures: number): Value =>
  typeof value === 'number' && Number.isFinite(value) ? roundToFigures(value, figures) : value;

/** What an answer to this quantity may differ by under the default policy. */
export const defaultAllowance = (quantity: Quantity, key: Amount): Allowance => allowanceOf(key, quantity.accept, quantity.asked);

/** Prints an amount with the quantity's figures and unit: in rectangular form where it is complex. */
export function printAmount(amount: Amount, { precision, unit }: Pick<Quantity, 'precision' | 'unit'>, notation: Notation): { text: string; tex: string } {
  if (typeof amount === 'number') return { text: printQuantity(amount, precision, unit, notation), tex: quantityToTex(amount, precision, unit, notation) };
  const { re, im } = amount;
  const sum = `${numberToTex(re, precision, notation)} ${im < 0 ? '-' : '+'} \\mathrm{j}\\,${numberToTex(Math.abs(im), precision, notation)}`;
  return {
    text: `${printRectangular(re, im, precision, unit, notation)} (${printPolar(re, im, precision, unit, notation)})`,
    tex: unit.tex === '' ? sum : `(${sum})\\ ${unit.tex}`,
  };
}

export const drawMissteps = (quantity: Quantity, scope: Scope, notation: Notation): DrawnMisstep[] =>
  quantity.missteps.map((misstep) => {
    const value = evaluateAmount(misstep.key, scope);
    const usable = value !== null && isFiniteAmount(value) ? value : null;
    return {
      value: usable, text: usable === null ? '' : printAmount(usable, quantity, notation).text, says: misstep.says, earns: misstep.earns,
      ...(misstep.separatedBy === undefined ? {} : { separatedBy: misstep.separatedBy }),
    };
  });
