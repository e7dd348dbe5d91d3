import { dimension } from './dimension';
import type { Dimension } from './dimension';

/**
 * What a unit measures where its dimension alone does not tell it: watts, voltamperes and vars share a dimension
 * and are three different answers.
 */
export type Kind =
  | 'active-power' | 'apparent-power' | 'reactive-power' | 'energy' | 'rotation' | 'angular-speed' | 'frequency'
  | 'angle' | 'temperature' | 'turns' | 'magnetomotive-force' | 'decibel';

/** One row: a unit without prefix. `factor`: coherent SI units in one of it. `names`: further spellings, exact in case. */
export type UnitRow = {
  code: string;
  symbol: string;
  tex: string;
  one: string;
  many: string;
  factor: number;
  dimension: Dimension;
  prefixes: string;
  kind?: Kind;
  /** Zero of the scale in the coherent SI unit (temperatures only). */
  offset?: number;
  names: string[];
};

type More = Partial<Pick<UnitRow, 'prefixes' | 'kind' | 'offset' | 'names' | 'tex' | 'many'>>;

const row = (code: string, symbol: string, one: string, factor: number, dimensions: string, more: More = {}): UnitRow => ({
  code, symbol, one, factor,
  dimension: dimension(dimensions),
  tex: more.tex ?? `\\mathrm{${symbol}}`,
  many: more.many ?? `${one}s`,
  prefixes: more.prefixes ?? '',
  names: more.names ?? [],
  ...(more.kind === undefined ? {} : { kind: more.kind }),
  ...(more.offset === undefined ? {} : { offset: more.offset }),
});

const SI = 'pnumkMG';
const POWER = 'm2 kg s-3';
const ENERGY = 'm2 kg s-2';
const TURN = 2 * Math.PI;

/**
 * Units of the trade. Factors: SI brochure 9th ed. (2019); inch, pound, standard gravity and their compounds: NIST SP 811
 * (2008) appendix B.8; circular mil: pi/4 square mils. Horsepower is the electric one, 746 W exactly (NIST SP 811), as on
 * rating plates. rpm counts turns (1/min); a turn is 2 pi rad only where it is converted to an angular speed.
 */
export const UNIT_ROWS: readonly UnitRow[] = [
  row('V', 'V', 'volt', 1, 'm2 kg s-3 A-1', { prefixes: SI }),
  row('A', 'A', 'ampere', 1, 'A', { prefixes: SI, names: ['amp', 'amps', 'Amp', 'Amps'] }),
  row('ohm', 'Ω', 'ohm', 1, 'm2 kg s-3 A-2', { prefixes: SI, tex: '\\Omega', names: ['Ω', 'Ohm', 'Ohms', 'R'] }),
  row('S', 'S', 'siemens', 1, 'm-2 kg-1 s3 A2', { prefixes: SI, many: 'siemens', names: ['mho', 'mhos'] }),
  row('W', 'W', 'watt', 1, POWER, { prefixes: SI, kind: 'active-power' }),
  row('VA', 'VA', 'voltampere', 1, POWER, { prefixes: SI, kind: 'apparent-power', names: ['V A', 'volt-ampere', 'volt-amperes', 'volt-amp', 'volt-amps'] }),
  row('var', 'var', 'var', 1, POWER, { prefixes: SI, kind: 'reactive-power', names: ['VAR', 'VAr', 'Var', 'vars', 'VARs', 'VARS'] }),
  row('hp', 'hp', 'horsepower', 746, POWER, { many: 'horsepower', kind: 'active-power', names: ['HP', 'Hp'] }),
  row('J', 'J', 'joule', 1, ENERGY, { prefixes: SI, kind: 'energy' }),
  row('Wh', 'Wh', 'watt-hour', 3600, ENERGY, { prefixes: SI, kind: 'energy', names: ['W h', 'watt hour', 'watt hours'] }),
  row('Btu', 'Btu', 'British thermal unit', 1055.05585262, ENERGY, { kind: 'energy', names: ['BTU'] }),
  row('Ah', 'Ah', 'ampere-hour', 3600, 's A', { prefixes: SI, names: ['A h', 'amp-hour', 'amp-hours', 'amp hour', 'amp hours'] }),
  row('C', 'C', 'coulomb', 1, 's A', { prefixes: SI }),
  row('F', 'F', 'farad', 1, 'm-2 kg-1 s4 A2', { prefixes: SI }),
  row('H', 'H', 'henry', 1, 'm2 kg s-2 A-2', { prefixes: SI, many: 'henries', names: ['henrys'] }),
  row('Wb', 'Wb', 'weber', 1, 'm2 kg s-2 A-1', { prefixes: SI }),
  row('T', 'T', 'tesla', 1, 'kg s-2 A-1', { prefixes: SI, many: 'teslas' }),
  row('At', 'At', 'ampere-turn', 1, 'A', { prefixes: 'k', kind: 'magnetomotive-force', names: ['AT', 'A t', 'amp-turn', 'amp-turns', 'ampere turns', 'amp turns'] }),
  row('turns', 'turns', 'turn', 1, '', { kind: 'turns', tex: '\\text{turns}', names: ['turn'] }),
  row('N', 'N', 'newton', 1, 'm kg s-2', { prefixes: SI }),
  row('lbf', 'lbf', 'pound-force', 4.4482216152605, 'm kg s-2', { many: 'pounds-force' }),
  row('ozf', 'ozf', 'ounce-force', 4.4482216152605 / 16, 'm kg s-2', { many: 'ounces-force' }),
  row('kgf', 'kgf', 'kilogram-force', 9.80665, 'm kg s-2', { many: 'kilograms-force', names: ['kp'] }),
  row('g', 'g', 'gram', 1e-3, 'kg', { prefixes: 'umk' }),
  row('lb', 'lb', 'pound', 0.45359237, 'kg', { names: ['lbs', 'lbm'] }),
  row('oz', 'oz', 'ounce', 0.45359237 / 16, 'kg'),
  row('m', 'm', 'metre', 1, 'm', { prefixes: 'numck', names: ['meter', 'meters'] }),
  row('in', 'in', 'inch', 0.0254, 'm', { many: 'inches', names: ['in.'] }),
  row('ft', 'ft', 'foot', 0.3048, 'm', { many: 'feet', names: ['ft.'] }),
  row('yd', 'yd', 'yard', 0.9144, 'm'),
  row('mi', 'mi', 'mile', 1609.344, 'm'),
  row('mil', 'mil', 'mil', 2.54e-5, 'm', { names: ['mils'] }),
  row('cmil', 'cmil', 'circular mil', (Math.PI / 4) * 2.54e-5 ** 2, 'm2', { prefixes: 'k', names: ['CM', 'circ mil'] }),
  row('L', 'L', 'litre', 1e-3, 'm3', { prefixes: 'm', names: ['l', 'liter', 'liters'] }),
  row('s', 's', 'second', 1, 's', { prefixes: 'num', names: ['sec', 'secs'] }),
  row('min', 'min', 'minute', 60, 's', { names: ['mins'] }),
  row('h', 'h', 'hour', 3600, 's', { names: ['hr', 'hrs'] }),
  row('d', 'd', 'day', 86400, 's'),
  row('Hz', 'Hz', 'hertz', 1, 's-1', { prefixes: 'mkMG', many: 'hertz', kind: 'frequency', names: ['cycles per second', 'c/s'] }),
  row('rpm', 'r/min', 'revolution per minute', 1 / 60, 's-1', { kind: 'rotation', many: 'revolutions per minute',
    names: ['RPM', 'Rpm', 'r/min', 'rev/min', 'revs/min', 'min-1', 'min^-1', '1/min', 'r.p.m.'] }),
  row('rev/s', 'r/s', 'revolution per second', 1, 's-1', { kind: 'rotation', many: 'revolutions per second', names: ['r/s', 'rps', 'revs/s'] }),
  row('rad/s', 'rad/s', 'radian per second', 1, 's-1', { kind: 'angular-speed', many: 'radians per second', names: ['rad/sec'] }),
  row('rad', 'rad', 'radian', 1, '', { kind: 'angle', prefixes: 'm' }),
  row('deg', '°', 'degree', TURN / 360, '', { kind: 'angle', tex: '{}^\\circ', names: ['°', 'degs'] }),
  row('percent', '%', 'percent', 0.01, '', { many: 'percent', tex: '\\%', names: ['%', 'per cent', 'pct'] }),
  row('none', '', '', 1, '', { many: '', tex: '', names: ['pu', 'p.u.', 'per unit', 'per-unit'] }),
  row('dB', 'dB', 'decibel', 1, '', { kind: 'decibel' }),
  row('K', 'K', 'kelvin', 1, 'K', { many: 'kelvins' }),
  row('degC', '°C', 'degree Celsius', 1, 'K', { kind: 'temperature', offset: 273.15, many: 'degrees Celsius', tex: '{}^\\circ\\mathrm{C}', names: ['°C', 'deg C', 'Celsius'] }),
  row('degF', '°F', 'degree Fahrenheit', 5 / 9, 'K', { kind: 'temperature', offset: 273.15 - 32 * (5 / 9), many: 'degrees Fahrenheit', tex: '{}^\\circ\\mathrm{F}', names: ['°F', 'deg F', 'Fahrenheit'] }),
  row('Pa', 'Pa', 'pascal', 1, 'm-1 kg s-2', { prefixes: 'kM' }),
  row('psi', 'psi', 'pound per square inch', 4.4482216152605 / 0.0254 ** 2, 'm-1 kg s-2', { many: 'pounds per square inch' }),
  row('cd', 'cd', 'candela', 1, 'cd'),
  row('lm', 'lm', 'lumen', 1, 'cd', { prefixes: 'k' }),
  row('lx', 'lx', 'lux', 1, 'm-2 cd', { prefixes: 'k', many: 'lux', names: ['lux'] }),
  row('fc', 'fc', 'footcandle', 1 / 0.3048 ** 2, 'm-2 cd'),
  row('money', '$', 'dollar', 1, 'money', { tex: '\\$', names: ['$', 'CAD', 'USD'] }),
  row('cent', '¢', 'cent', 0.01, 'money', { tex: '\\text{¢}', names: ['¢', 'c'] }),
  row('AWG', 'AWG', 'AWG', 1, 'gauge', { many: 'AWG', names: ['awg'] }),
];

export type Prefix = { letter: string; symbol: string; word: string; exponent: number };

export const PREFIXES: readonly Prefix[] = [
  { letter: 'p', symbol: 'p', word: 'pico', exponent: -12 },
  { letter: 'n', symbol: 'n', word: 'nano', exponent: -9 },
  { letter: 'u', symbol: 'µ', word: 'micro', exponent: -6 },
  { letter: 'm', symbol: 'm', word: 'milli', exponent: -3 },
  { letter: 'c', symbol: 'c', word: 'centi', exponent: -2 },
  { letter: 'k', symbol: 'k', word: 'kilo', exponent: 3 },
  { letter: 'M', symbol: 'M', word: 'mega', exponent: 6 },
  { letter: 'G', symbol: 'G', word: 'giga', exponent: 9 },
];
