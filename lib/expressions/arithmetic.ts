import { complexMath } from './mathjs';
import type { Complex as MathComplex } from './mathjs';

/** A complex number as plain data. */
export type Complex = { re: number; im: number };
export type Value = number | Complex | boolean | string;

/** Values of givens and derived names, and of the parts before; each in the unit of its name. */
export type Scope = { values: Readonly<Record<string, Value>>; parts: Readonly<Record<string, Value>> };
export type Run = (scope: Scope) => Value;

/** A value is missing, or of a kind that a sign or function does not take. */
export class ExpressionError extends Error {
  override name = 'ExpressionError';
}

export const isComplex = (value: Value): value is Complex => typeof value === 'object';

/** Without the class of the library, so that it can be stored and compared. */
export const toPlain = (value: Value): Value => (isComplex(value) ? { re: value.re, im: value.im } : value);

function asComplex(value: Value, sign: string): MathComplex {
  if (typeof value === 'number') return complexMath.complex(value, 0);
  if (isComplex(value)) return complexMath.complex(value.re, value.im);
  throw new ExpressionError(`${sign} needs numbers.`);
}

type Arithmetic = '+' | '-' | '*' | '/' | '^';

const MATH = {
  '+': complexMath.add, '-': complexMath.subtract, '*': complexMath.multiply, '/': complexMath.divide, '^': complexMath.pow,
};

/** The five signs where one side is complex. */
export function complexly(sign: Arithmetic, left: Value, right: Value): Complex {
  const [a, b] = [asComplex(left, sign), asComplex(right, sign)];
  return plainComplex(MATH[sign](a, b));
}

function plainComplex(value: unknown): Complex {
  if (typeof value === 'number') return { re: value, im: 0 };
  const { re, im } = value as Complex;
  return { re, im };
}

const COMPLEX_FUNCTIONS: Readonly<Record<string, (z: MathComplex) => Value>> = {
  sqrt: (z) => plainComplex(complexMath.sqrt(z)),
  exp: (z) => plainComplex(complexMath.exp(z)),
  log: (z) => plainComplex(complexMath.log(z)),
  conj: (z) => plainComplex(complexMath.conj(z)),
  abs: (z) => Math.hypot(z.re, z.im),
  arg: (z) => Math.atan2(z.im, z.re),
  argd: (z) => (Math.atan2(z.im, z.re) * 180) / Math.PI,
  re: (z) => z.re,
  im: (z) => z.im,
};

/** A function of one complex number. */
export function complexFunction(name: string, args: readonly Value[]): Value {
  const apply = Object.hasOwn(COMPLEX_FUNCTIONS, name) ? COMPLEX_FUNCTIONS[name] : undefined;
  const [value] = args;
  if (value === undefined || args.length !== 1 || !apply) throw new ExpressionError(`${name} needs real numbers.`);
  return apply(asComplex(value, name));
}

/** Equal within one part in 10^12, so that the noise of binary fractions decides nothing. */
const near = (a: number, b: number) => a === b || Math.abs(a - b) <= 1e-12 * Math.max(Math.abs(a), Math.abs(b));

export function equals(a: Value, b: Value): boolean {
  if (typeof a === 'number' && typeof b === 'number') return near(a, b);
  if (typeof a === 'object' || typeof b === 'object') {
    const [x, y] = [asComplex(a, '=='), asComplex(b, '==')];
    return near(x.re, y.re) && near(x.im, y.im);
  }
  return a === b;
}

export function below(a: Value, b: Value): boolean {
  if (typeof a !== 'number' || typeof b !== 'number') throw new ExpressionError('Only real numbers are compared by size.');
  return a < b && !near(a, b);
}

export function truth(value: Value): boolean {
  if (typeof value !== 'boolean') throw new ExpressionError('A yes or no is needed there.');
  return value;
}
