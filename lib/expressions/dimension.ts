import { DIMENSIONLESS, equalDimensions, multiplyDimensions, raiseDimension } from '@/lib/numeric/dimension';
import type { Expression } from './compile';
import { MISSING_VALUES, Misfit, PURE, inWords, isPure, merge, misfit, sameFactor } from './quantity';
import type { DimensionProblem, Quantity } from './quantity';
import { runOf } from './run';
import { isComparison, isFixed, textOf } from './tree';
import type { Tree } from './tree';

export type { DimensionProblem, Quantity } from './quantity';

/** The unit, or what `dimensionOf` found, of each name and part of an expression. */
export type Units = { name: (name: string) => Quantity; part: (part: string) => Quantity };

const DEGREE = Math.PI / 180;

/** Numbers that convert nothing: they occur in formulas as they are. */
const PLAIN = new Set([0, 0.5, 1, 2, 3, 4]);
const bare = (value: number): Quantity => ({ dimension: null, factor: PLAIN.has(value) ? 1 : null });

const times = (a: Quantity, b: Quantity, power: 1 | -1): Quantity => ({
  dimension: a.dimension === null && b.dimension === null ? null : multiplyDimensions(a.dimension ?? DIMENSIONLESS, raiseDimension(b.dimension ?? DIMENSIONLESS, power)),
  factor: a.factor === null || b.factor === null ? null : a.factor * b.factor ** power,
});

/** The value of an exponent that depends on nothing, else null. */
function fixedNumber(tree: Tree): number | null {
  if (!isFixed(tree)) return null;
  const value = runOf(tree)(MISSING_VALUES);
  return typeof value === 'number' && Number.isFinite(value) ? value : null;
}

function raised(base: Quantity, exponent: Tree, units: Units, where: string): Quantity {
  const power = fixedNumber(exponent);
  if (power !== null) {
    return { dimension: base.dimension === null ? null : raiseDimension(base.dimension, power), factor: base.factor === null ? null : base.factor ** power };
  }
  if (!isPure(base)) misfit('dimension', `${where} raises ${inWords(base)} to a power that is not fixed.`);
  pure(walk(exponent, units), 'The exponent', textOf(exponent));
  return { dimension: DIMENSIONLESS, factor: base.factor === 1 ? 1 : null };
}

function pure(value: Quantity, what: string, where: string): void {
  if (!isPure(value)) misfit('dimension', `${what} ${where} comes out in ${inWords(value)}, and a pure number is needed there.`);
}

/** An argument of a function of pure numbers, of which one unit must be `factor` (or a bare 1 where `loose`). */
function argument(tree: Tree, units: Units, name: string, factor: number, loose = false): void {
  const value = walk(tree, units);
  pure(value, `In ${name}(…),`, textOf(tree));
  const fits = value.factor === null || sameFactor(value.factor, factor) || (loose && value.factor === 1);
  if (!fits) misfit('factor', `${name}(${textOf(tree)}) takes ${factor === 1 ? (/^(sin|cos|tan)/.test(name) ? 'radians; use the function in degrees, or convert' : 'a pure number; convert the unit') : 'degrees; convert the unit'}.`);
}

const SAME = new Set(['abs', 'round', 'floor', 'ceil', 're', 'im', 'conj']);
const TRIG = new Set(['sin', 'cos', 'tan', 'exp', 'log', 'log10', 'asin', 'acos', 'atan']);

function call(name: string, args: Tree[], units: Units, where: string): Quantity {
  const [first, second] = args;
  const value = () => (first ? walk(first, units) : PURE);
  const merged = () => args.map((arg) => walk(arg, units)).reduce((a, b) => merge(a, b, where));
  if (SAME.has(name)) return value();
  if (name === 'min' || name === 'max') return merged();
  if (name === 'sqrt' && first) return first.is === 'number' ? { dimension: null, factor: 1 } : raised(value(), { is: 'number', value: 0.5 }, units, where);
  if (name === 'polar' || name === 'polard') {
    if (second) argument(second, units, name, name === 'polard' ? DEGREE : 1, name === 'polard');
    return value();
  }
  if (name === 'arg' || name === 'argd') {
    value();
    return { dimension: DIMENSIONLESS, factor: name === 'argd' ? DEGREE : 1 };
  }
  if (name === 'sign') value();
  else if (name === 'between' || name === 'atan2') merged();
  else for (const arg of args) inTrigonometry(name, arg, units);
  return { dimension: DIMENSIONLESS, factor: /^a.*d$/.test(name) ? DEGREE : 1 };
}

function inTrigonometry(name: string, arg: Tree, units: Units): void {
  if (TRIG.has(name) || name.startsWith('a')) argument(arg, units, name, 1);
  else argument(arg, units, name, DEGREE, true);
}

function binary(tree: Tree & { is: 'binary' }, units: Units): Quantity {
  const { sign } = tree;
  const left = walk(tree.left, units);
  if (sign === '^') return raised(left, tree.right, units, textOf(tree));
  const right = walk(tree.right, units);
  if (sign === '*' || sign === '/') return times(left, right, sign === '*' ? 1 : -1);
  if (sign === '+' || sign === '-') return merge(asZero(tree.left, left, right), asZero(tree.right, right, left), textOf(tree));
  if (isComparison(sign)) merge(asZero(tree.left, left, right), asZero(tree.right, right, left), textOf(tree));
  return PURE;
}

/** Zero is zero in every unit. */
const asZero = (tree: Tree, value: Quantity, other: Quantity): Quantity => (tree.is === 'number' && tree.value === 0 ? other : value);

function walk(tree: Tree, units: Units): Quantity {
  switch (tree.is) {
    case 'number': return bare(tree.value);
    case 'constant': return { dimension: null, factor: 1 };
    case 'truth': case 'text': return PURE;
    case 'name': return units.name(tree.name);
    case 'part': return units.part(tree.part);
    case 'unary': return walk(tree.of, units);
    case 'binary': return binary(tree, units);
    case 'choose': {
      walk(tree.test, units);
      return merge(walk(tree.yes, units), walk(tree.no, units), textOf(tree));
    }
    case 'call': return call(tree.name, tree.args, units, textOf(tree));
  }
}

/** Runs a walk and turns the misfit that it meets into a value. */
function caught<Found>(run: () => Found): { ok: true; value: Found } | { ok: false; problem: DimensionProblem } {
  try {
    return { ok: true, value: run() };
  } catch (error) {
    if (error instanceof Misfit) return { ok: false, problem: error.problem };
    throw error;
  }
}

/** The dimension and size of an expression, for a derived value that states no unit; or the problem within it. */
export const dimensionOf = (expression: Expression, units: Units): { ok: true; value: Quantity } | { ok: false; problem: DimensionProblem } =>
  caught(() => walk(expression.tree, units));

/**
 * Holds an expression against the unit that it is given in; null where it fits. Dimensions must agree throughout; unit
 * factors must cancel unless a number other than 0–4, 0.5, pi or sqrt(n) stands in the product, since it may convert
 * (1000, 60, 746). A bare number takes the unit of what it is added to or compared with; exponents and the arguments of
 * trigonometric functions are looked at by themselves.
 */
export function checkDimension(expression: Expression, units: Units, target: Quantity): DimensionProblem | null {
  const found = dimensionOf(expression, units);
  if (!found.ok) return found.problem;
  const { dimension, factor } = found.value;
  if (dimension === null || target.dimension === null) return null;
  if (!equalDimensions(dimension, target.dimension)) {
    return { problem: 'dimension', says: `${expression.source} comes out in ${inWords(found.value)}, and ${inWords(target)} are asked.` };
  }
  if (factor === null || target.factor === null || sameFactor(factor, target.factor)) return null;
  const ratio = factor / target.factor;
  const times = ratio > 1 ? `${Number(ratio.toPrecision(6))} times too small` : `${Number((1 / ratio).toPrecision(6))} times too large`;
  return { problem: 'factor', says: `The units of ${expression.source} do not cancel: its value is ${times} for the unit asked. Convert, or state a trade-constant.` };
}
