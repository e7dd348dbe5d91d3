import { roundToDecimals } from '@/lib/numeric/digits';

/** A function that expressions may call: `least` to `most` arguments, and its value for real ones. */
export type RealFunction = { least: number; most: number; real: (...args: number[]) => number };

const RADIANS = Math.PI / 180;

/** Sine of an angle [degrees], exact where it is 0, 1/2 or 1. */
function sind(degrees: number): number {
  const turn = ((degrees % 360) + 360) % 360;
  const [half, sign] = turn >= 180 ? [turn - 180, -1] : [turn, 1];
  const first = half > 90 ? 180 - half : half;
  if (first === 0) return 0;
  if (first === 30) return sign * 0.5;
  return first === 90 ? sign : sign * Math.sin(first * RADIANS);
}
const cosd = (degrees: number) => sind(degrees + 90);
const tand = (degrees: number) => (((degrees % 180) + 180) % 180 === 45 ? 1 : ((degrees % 180) + 180) % 180 === 135 ? -1 : sind(degrees) / cosd(degrees));

/** Degrees of an inverse function, whole where the whole angle gives the argument back. */
const inverse = (radians: (x: number) => number, back: (degrees: number) => number) => (x: number) => {
  const degrees = radians(x) / RADIANS;
  const whole = Math.round(degrees);
  return back(whole) === x ? whole : degrees;
};

const one = (real: (x: number) => number): RealFunction => ({ least: 1, most: 1, real });
const MOST = 64;

/** Angles in radians, and in degrees where the name ends in d; `round` goes half away from zero on the decimal digits. */
export const REAL_FUNCTIONS: Readonly<Record<string, RealFunction>> = {
  sqrt: one(Math.sqrt), abs: one(Math.abs), floor: one(Math.floor), ceil: one(Math.ceil), sign: one(Math.sign), exp: one(Math.exp), log10: one(Math.log10),
  log: { least: 1, most: 2, real: (x, base) => (base === undefined ? Math.log(x) : Math.log(x) / Math.log(base)) },
  round: { least: 1, most: 2, real: (x, decimals = 0) => (Number.isFinite(x) ? roundToDecimals(x, decimals) : x) },
  min: { least: 1, most: MOST, real: Math.min },
  max: { least: 1, most: MOST, real: Math.max },
  sin: one(Math.sin), cos: one(Math.cos), tan: one(Math.tan), asin: one(Math.asin), acos: one(Math.acos), atan: one(Math.atan),
  atan2: { least: 2, most: 2, real: Math.atan2 },
  sind: one(sind), cosd: one(cosd), tand: one(tand),
  asind: one(inverse(Math.asin, sind)), acosd: one(inverse(Math.acos, cosd)), atand: one(inverse(Math.atan, tand)),
  re: one((x) => x), im: one(() => 0), conj: one((x) => x),
  arg: one((x) => Math.atan2(0, x)), argd: one((x) => Math.atan2(0, x) / RADIANS),
};

/** Functions whose value is no real number: polar forms (magnitude, angle in radians or degrees), and a test. */
export const OTHER_FUNCTIONS: Readonly<Record<string, { least: number; most: number }>> = {
  polar: { least: 2, most: 2 },
  polard: { least: 2, most: 2 },
  between: { least: 3, most: 3 },
};

export const CONSTANTS = ['pi', 'e', 'i'] as const;

/** Functions that describe a machine: kept for a later version of the language. */
export const MACHINE_FUNCTIONS: ReadonlySet<string> = new Set(['at']);

export const functionOf = (name: string): { least: number; most: number } | undefined =>
  Object.hasOwn(REAL_FUNCTIONS, name) ? REAL_FUNCTIONS[name] : Object.hasOwn(OTHER_FUNCTIONS, name) ? OTHER_FUNCTIONS[name] : undefined;

export const FUNCTION_NAMES: readonly string[] = [...Object.keys(REAL_FUNCTIONS), ...Object.keys(OTHER_FUNCTIONS)];

/** Words that cannot be the name of a given or of a derived value. */
export const RESERVED: ReadonlySet<string> = new Set([
  ...CONSTANTS, ...FUNCTION_NAMES, ...MACHINE_FUNCTIONS, 'part', 'machine', 'and', 'or', 'not', 'xor', 'mod', 'to', 'in',
  'true', 'false', 'null', 'undefined', 'NaN', 'Infinity', 'end', 'plate', ...Object.getOwnPropertyNames(Object.prototype),
]);
