import Decimal from 'decimal.js';
import { refuse } from '@/lib/result';
import type { Result } from '@/lib/result';

/** What a given is drawn from: a list, a range with its step, or the preferred values (IEC 60063) within a range. */
export type DomainSpec =
  | { choose: readonly (number | string)[] }
  | { range: readonly [number, number]; step: number }
  | { series: string; range: readonly [number, number] };

/** One value: `digits` is its exact decimal text (`0.30`), `decimals` how many decimals it prints with. */
export type DomainValue = { value: number | string; decimals: number; digits: string };

/** The values that a given may take, in order; `at` takes a place from 0 to count - 1. */
export type Domain = { count: number; at: (place: number) => DomainValue };

const MOST = 1_000_000;

const exact = (decimal: Decimal, decimals: number): DomainValue => ({ value: decimal.toNumber(), decimals, digits: decimal.toFixed(decimals) });
const bare = (value: number | string): DomainValue => {
  if (typeof value === 'string') return { value, decimals: 0, digits: value };
  const decimal = new Decimal(value);
  return exact(decimal, decimal.decimalPlaces());
};

function listed(values: readonly DomainValue[]): Result<Domain, 'schema'> {
  const domain: Domain = {
    count: values.length,
    at: (place) => {
      const value = values[place];
      if (!value) throw new RangeError(`A domain of ${values.length} values has no place ${place}`);
      return value;
    },
  };
  return { ok: true, value: domain };
}

function stepped(range: readonly [number, number], step: number): Result<Domain, 'schema'> {
  const [low, high, by] = [new Decimal(range[0]), new Decimal(range[1]), new Decimal(step)];
  if (!by.gt(0)) return refuse('schema', 'The step must be greater than 0.');
  if (high.lt(low)) return refuse('schema', `The range runs from ${low} down to ${high}; write the smaller value first.`);
  const steps = high.minus(low).div(by).floor();
  if (steps.gte(MOST)) return refuse('schema', `The range holds more than ${MOST} values; take a larger step.`);
  const decimals = Math.max(low.decimalPlaces(), by.decimalPlaces());
  const count = steps.toNumber() + 1;
  const at = (place: number) => {
    if (!Number.isInteger(place) || place < 0 || place >= count) throw new RangeError(`A domain of ${count} values has no place ${place}`);
    return exact(low.plus(by.times(place)), decimals);
  };
  return { ok: true, value: { count, at } };
}

/** E24 and those within it are no geometric series exactly: they stand as in IEC 60063:2015 table 1. */
const E24 = [10, 11, 12, 13, 15, 16, 18, 20, 22, 24, 27, 30, 33, 36, 39, 43, 47, 51, 56, 62, 68, 75, 82, 91];
const LISTED: Record<string, readonly number[]> = {
  E3: E24.filter((_, i) => i % 8 === 0),
  E6: E24.filter((_, i) => i % 4 === 0),
  E12: E24.filter((_, i) => i % 2 === 0),
  E24,
};
const ROUNDED: Record<string, number> = { E48: 48, E96: 96, E192: 192 };

/** Digits of one decade (10 to 99, or 100 to 999), or null for an unknown series. 920 of E192 is no rounded power (IEC 60063). */
function decade(series: string): { digits: readonly number[]; power: number } | null {
  const digits = Object.hasOwn(LISTED, series) ? LISTED[series] : undefined;
  if (digits) return { digits, power: 1 };
  const count = Object.hasOwn(ROUNDED, series) ? ROUNDED[series] : undefined;
  if (count === undefined) return null;
  const rounded = Array.from({ length: count }, (_, i) => Math.round(100 * 10 ** (i / count)));
  return { digits: rounded.map((value) => (value === 919 ? 920 : value)), power: 2 };
}

function preferred(series: string, range: readonly [number, number]): Result<Domain, 'schema'> {
  const found = decade(series);
  if (!found) return refuse('schema', `There is no series ${series}; use one of ${[...Object.keys(LISTED), ...Object.keys(ROUNDED)].join(', ')}.`);
  const [low, high] = [new Decimal(range[0]), new Decimal(range[1])];
  if (!low.gt(0) || high.lt(low)) return refuse('schema', 'The range of a series runs from a value above 0 to a larger one.');
  if (high.div(low).gt('1e12')) return refuse('schema', 'The range of a series spans at most twelve decades.');
  const values: DomainValue[] = [];
  const ten = new Decimal(10);
  for (let exponent = low.logarithm(10).floor().toNumber() - 1; ten.pow(exponent).lte(high); exponent += 1) {
    for (const digits of found.digits) {
      const value = new Decimal(digits).times(ten.pow(exponent - found.power));
      if (value.gte(low) && value.lte(high)) values.push(exact(value, value.decimalPlaces()));
    }
  }
  if (values.length === 0) return refuse('schema', `No value of ${series} lies between ${low} and ${high}.`);
  return listed(values);
}

/**
 * The exact decimals that a given may take. Refused with `schema`: an empty list, a step that is not positive, a range
 * that runs backwards, an unknown series, more than a million values.
 */
export function domainOf(spec: DomainSpec): Result<Domain, 'schema'> {
  const numbers = 'choose' in spec ? spec.choose : [...spec.range, ...('step' in spec ? [spec.step] : [])];
  if (numbers.some((value) => typeof value === 'number' && !Number.isFinite(value))) return refuse('schema', 'A value is not a finite number.');
  if ('choose' in spec) {
    return spec.choose.length === 0 ? refuse('schema', 'The list to choose from is empty.') : listed(spec.choose.map(bare));
  }
  return 'series' in spec ? preferred(spec.series, spec.range) : stepped(spec.range, spec.step);
}
