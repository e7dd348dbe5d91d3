import { DIMENSIONLESS, equalDimensions, multiplyDimensions, raiseDimension } from './dimension';
import type { Dimension } from './dimension';
import { shift } from './digits';
import { PREFIXES, UNIT_ROWS } from './units-table';
import type { Kind, Prefix, UnitRow } from './units-table';

/**
 * A unit of measure. `code` is how templates write it, `symbol` how it is printed, `tex` the same inside a formula,
 * `one` and `many` its words. `factor`: coherent SI units in one of it. `kind` parts units of one dimension that are
 * different answers (W, VA, var). `base`, `exponent`: the unit without its prefix, and the prefix as a power of ten.
 */
export type Unit = {
  code: string;
  symbol: string;
  tex: string;
  one: string;
  many: string;
  factor: number;
  dimension: Dimension;
  kind?: Kind;
  offset?: number;
  base?: string;
  exponent?: number;
  /** Prefix letters that the unit takes; empty for units that take none and for those that have one already. */
  prefixes: string;
};

const LONGEST = 60;

const named = new Map<string, UnitRow>();
const folded = new Map<string, UnitRow>();
for (const unit of UNIT_ROWS) {
  for (const name of [unit.code, unit.symbol, unit.one, unit.many, ...unit.names].map(tidy)) {
    if (!named.has(name)) named.set(name, unit);
    if (!folded.has(name.toLowerCase()) && name !== 'm') folded.set(name.toLowerCase(), unit);
  }
}

function plain(row: UnitRow): Unit {
  const { names: _, ...unit } = row;
  return unit;
}

function prefixed(row: UnitRow, prefix: Prefix): Unit {
  const stem = row.code === 'ohm' && (prefix.letter === 'k' || prefix.letter === 'M') ? prefix.word.slice(0, -1) : prefix.word;
  return {
    ...plain(row),
    code: prefix.letter + row.code,
    symbol: prefix.symbol + row.symbol,
    tex: (prefix.letter === 'u' ? '\\text{µ}' : `\\mathrm{${prefix.letter}}`) + row.tex,
    one: stem + row.one,
    many: stem + row.many,
    factor: shift(row.factor, prefix.exponent),
    prefixes: '',
    base: row.code,
    exponent: prefix.exponent,
  };
}

/** One spelling for each sign: micro, ohm, minus, dots of products, raised digits, 'per'. */
function tidy(text: string): string {
  return text
    .replaceAll(/[µμ]/g, 'u')
    .replaceAll(/[ΩΩ]/g, 'ohm')
    .replaceAll(/[−–‑]/g, '-')
    .replaceAll('⁻', '-')
    .replaceAll('¹', '1')
    .replaceAll('²', '2')
    .replaceAll('³', '3')
    .replaceAll(/[⋅·•*×\s]/g, ' ')
    .split(' ')
    .filter(Boolean)
    .join(' ')
    .replaceAll(' per ', '/');
}

/** A unit that is no product or quotient, with or without prefix. `fold`: also in the wrong case, where that leaves m and M apart. */
function simple(text: string, fold: boolean): Unit | null {
  const names = fold ? folded : named;
  const spelled = (name: string) => names.get(fold ? name.toLowerCase() : name);
  const whole = text === 'M' ? undefined : spelled(text);
  if (whole) return plain(whole);
  for (const prefix of PREFIXES) {
    const letter = text[0] === prefix.letter || (fold && prefix.letter === 'k' && text[0] === 'K');
    const row = letter ? spelled(text.slice(1)) : undefined;
    if (row?.prefixes.includes(prefix.letter)) return prefixed(row, prefix);
    const start = fold ? text.toLowerCase() : text;
    const rest = start.startsWith(prefix.word) ? start.slice(prefix.word.length) : '';
    const word = rest === '' ? undefined : spelled(rest);
    if (word?.prefixes.includes(prefix.letter)) return prefixed(word, prefix);
    if (word === undefined && prefix.exponent > 0 && start.startsWith(`${prefix.word.slice(0, -1)}ohm`)) return prefixed(ohm(), prefix);
  }
  return null;
}

function ohm(): UnitRow {
  const row = named.get('ohm');
  if (!row) throw new Error('The table of units has no ohm');
  return row;
}

function raised(unit: Unit, power: number): Unit {
  if (power === 1) return unit;
  const word = power === 2 ? 'square ' : 'cubic ';
  const raise = power === 2 ? '²' : '³';
  return {
    code: `${unit.code}${power}`,
    symbol: unit.symbol + raise,
    tex: `${unit.tex}^{${power}}`,
    one: word + unit.one,
    many: word + unit.many,
    factor: unit.factor ** power,
    dimension: raiseDimension(unit.dimension, power),
    prefixes: '',
  };
}

function factorOf(text: string, fold: boolean): Unit | null {
  const unit = simple(text, fold);
  if (unit) return unit;
  const last = text.at(-1);
  if (last !== '2' && last !== '3') return null;
  const base = simple(text.slice(0, text.at(-2) === '^' ? -2 : -1), fold);
  return base && raised(base, Number(last));
}

const LENGTHS = new Set(['ft', 'in']);

/** Pounds and ounces beside a length are forces: lb-ft is lbf ft. */
function asTorque(units: Unit[]): Unit[] {
  const mass = units.length === 2 && units.some((unit) => LENGTHS.has(unit.code));
  if (!mass) return units;
  return units.map((unit) => (unit.code === 'lb' ? simple('lbf', false) : unit.code === 'oz' ? simple('ozf', false) : unit) ?? unit);
}

/** The force stands first: ft-lb is lbf ft. */
function inOrder(units: Unit[]): Unit[] {
  const [first, second] = units;
  return units.length === 2 && first && second && LENGTHS.has(first.code) && (second.code === 'lbf' || second.code === 'ozf') ? [second, first] : units;
}

function product(text: string, fold: boolean): Unit[] | null {
  const units: Unit[] = [];
  for (const term of text.split(/[ -]/).filter(Boolean)) {
    const unit = factorOf(term, fold) ?? null;
    if (!unit) return null;
    units.push(unit);
  }
  if (units.length === 0 || units.length > 4) return null;
  return inOrder(asTorque(units));
}

function compound(above: Unit[], below: Unit[]): Unit {
  const words = (last: 'one' | 'many') => {
    const head = above.map((unit, i) => unit[i === above.length - 1 ? last : 'one']).join(' ');
    return [head, ...below.map((unit) => `per ${unit.one}`)].filter(Boolean).join(' ');
  };
  const joined = (field: 'code' | 'symbol' | 'tex', dot: string) =>
    [above.map((unit) => unit[field]).join(dot) || '1', ...below.map((unit) => unit[field])].join('/');
  return {
    code: joined('code', ' '),
    symbol: joined('symbol', '·'),
    tex: joined('tex', '{\\cdot}'),
    one: words('one'),
    many: words('many'),
    factor: above.reduce((f, unit) => f * unit.factor, 1) / below.reduce((f, unit) => f * unit.factor, 1),
    dimension: [...above, ...below.map((unit) => ({ dimension: raiseDimension(unit.dimension, -1) }))]
      .reduce((sum, unit) => multiplyDimensions(sum, unit.dimension), DIMENSIONLESS),
    prefixes: '',
  };
}

/** Newton metres and the like run together without a sign: Nm, ftlb. */
const RUN_TOGETHER = new Map(Object.entries({
  Nm: 'N m', kNm: 'kN m', mNm: 'mN m', Ncm: 'N cm', ftlb: 'lbf ft', lbft: 'lbf ft', lbfft: 'lbf ft', ftlbf: 'lbf ft',
  ftlbs: 'lbf ft', inlb: 'lbf in', lbin: 'lbf in', ozin: 'ozf in', inoz: 'ozf in',
}));
const FOLDED_TOGETHER = new Map([...RUN_TOGETHER].map(([name, units]) => [name.toLowerCase(), units]));

function parse(text: string, fold: boolean): Unit | null {
  if (text.length > LONGEST) return null;
  const whole = tidy(text);
  const together = fold ? FOLDED_TOGETHER.get(whole.toLowerCase()) : RUN_TOGETHER.get(whole);
  const unit = together === undefined ? simple(whole, fold) : null;
  if (unit) return unit;
  const [above = '', ...below] = (together ?? whole).split('/').map((part) => part.trim());
  const upper = above === '1' ? [] : product(above, fold);
  const lower = below.map((part) => product(part, fold));
  if (!upper || lower.length > 2 || (upper.length === 0 && lower.length === 0)) return null;
  const under: Unit[] = [];
  for (const units of lower) {
    if (!units) return null;
    under.push(...units);
  }
  const [only] = upper;
  return only && upper.length === 1 && under.length === 0 ? only : compound(upper, under);
}

/** A unit by its code or another of its spellings, exact in case (`kV`, `ohm/km`, `lbf ft`, `%`); null where there is none. */
export const parseUnit = (text: string): Unit | null => parse(text, false);

/** As parseUnit. */
export const findUnit = (code: string): Unit | null => parseUnit(code);

/** Everything that a person may have meant by a unit, the most literal first; empty where it is not a unit at all. */
export function unitReadings(text: string): Unit[] {
  const literal = parse(text, false);
  const loose = parse(text, true);
  const force = literal?.code === 'lb' || literal?.code === 'oz' ? parse(`${literal.code}f`, false) : null;
  return [literal, loose, force].filter((unit): unit is Unit => unit !== null);
}

/** Whether two units measure the same base dimensions (W and VA do). For the check of keys. */
export const sameDimension = (a: Unit, b: Unit): boolean => equalDimensions(a.dimension, b.dimension);

const turning = (unit: Unit) => unit.kind === 'rotation' || unit.kind === 'angular-speed';

/** Whether an answer in `given` can stand for one in `asked`: kVA is not kW, hertz is no speed, radians per second are. */
export const answers = (given: Unit, asked: Unit): boolean =>
  sameDimension(given, asked) && (given.kind === undefined || given.kind === asked.kind || (turning(given) && turning(asked)));

/** value in `from` -> value in `to`; temperatures on their scales, a turn as 2 pi rad. Throws where the dimensions differ. */
export function convert(value: number, from: Unit, to: Unit): number {
  if (from.code === to.code) return value;
  if (!sameDimension(from, to)) throw new RangeError(`${from.code} does not convert to ${to.code}`);
  if (from.offset !== undefined && to.offset !== undefined) {
    return (value * from.factor + from.offset - to.offset) / to.factor;
  }
  const radians = (unit: Unit) => (unit.kind === 'rotation' ? unit.factor * 2 * Math.PI : unit.factor);
  const ratio = turning(from) && turning(to) ? radians(from) / radians(to) : from.factor / to.factor;
  const power = Math.round(Math.log10(ratio));
  return Math.abs(ratio / 10 ** power - 1) < 1e-12 ? shift(value, power) : value * ratio;
}
