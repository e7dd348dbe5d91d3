import { roundToFigures, shift } from './digits';
import { readComplex } from './complex-reader';
import { isDigit, scanAmount, skipSpaces } from './numerals';
import type { Numeral, Typed } from './numerals';
import type { Notation } from './notation';
import { printPolar, printRectangular, printShortest, unitInWords } from './printer';
import { answers, convert, parseUnit, unitReadings } from './units';
import { PREFIXES } from './units-table';
import type { Unit } from './units';

export const LONGEST_ANSWER = 200;

/** `unit`: what is asked. `ratio`: 0.714 may stand for 71.4 %. `unitMissing`: what the policy says of a number without unit. */
export type Asked = {
  unit: Unit;
  notation: Notation;
  ratio?: boolean;
  form?: 'real' | 'complex';
  unitMissing?: 'read' | 'lose';
};

/**
 * What an answer reads as. `value` [asked unit] is the number, or the real part beside `imaginary`; `shown` the same in
 * print and words; `says` the echo; `unit` the code of the unit that was written; `ambiguous` the other thing that the
 * same signs could mean [asked unit].
 */
export type Read = {
  ok: true;
  value: number;
  imaginary?: number;
  shown: { value: string; unit: string };
  unitGiven: boolean;
  unit?: string;
  says: string;
  ambiguous?: { value: number; says: string };
};
export type UnreadCode = 'blank' | 'too-long' | 'unread' | 'unit' | 'dimension';
export type Unread = { ok: false; code: UnreadCode; says: string };
export type Reading = Read | Unread;

const unread = (code: UnreadCode, says: string): Unread => ({ ok: false, code, says });

/**
 * Reads a typed answer against what is asked: a number or fraction with or without unit, with a prefix in the place of
 * the mark (4R7), with either decimal mark, as a power of ten, and complex numbers in polar or rectangular form. One pure
 * function for the echo in the browser and for marking; time is linear in the length.
 */
export function readNumber(text: string, asked: Asked): Reading {
  if (text.length > LONGEST_ANSWER) return unread('too-long', `An answer has at most ${LONGEST_ANSWER} characters. Shorten it to the number and its unit.`);
  const line = clean(text);
  if (line === '') return unread('blank', 'Nothing is written here yet.');
  const typed = readComplex(line, asked.notation) ?? readReal(line, asked);
  if (!typed) return unread('unread', `This is not read as a number. Write the number and then its unit${like(asked)}.`);
  if (!Number.isFinite(typed.re) || !Number.isFinite(typed.im)) return unread('unread', 'This number is too large to be read, or divides by zero.');
  if (typed.complex && asked.form !== 'complex') return unread('unread', 'One number is asked here, without an angle or an imaginary part.');
  return inAskedUnit(typed, asked);
}

const like = ({ unit, notation }: Asked) => (unit.symbol === '' ? '' : `, like 12${notation.decimal}5 ${unit.symbol}`);

/** One kind of minus, no outer spaces, and nothing before an equals sign (`I = 12 A`). */
function clean(text: string): string {
  const line = text.replaceAll(/[−–‒﹣－]/g, '-').trim();
  const equals = line.search(/[=≈]/);
  const name = line.slice(0, Math.max(0, equals)).trim();
  return equals >= 0 && name.length <= 12 && /^[A-Za-z_0-9]*$/.test(name) && !isDigit(name[0]) ? line.slice(equals + 1).trim() : line;
}

function readReal(line: string, asked: Asked): Typed | null {
  const money = line.startsWith('$') ? 1 : 0;
  let at = skipSpaces(line, money);
  const negative = line[at] === '-';
  if (negative || line[at] === '+') at = skipSpaces(line, at + 1);
  if (money === 0 && line[at] === '$') return readReal(`$${line.slice(0, at)}${line.slice(at + 1)}`, asked);
  const size = asked.unit.code === 'AWG' ? readGauge(line.slice(at)) : null;
  const amount = size ?? scanAmount(line, at, asked.notation);
  if (!amount) return null;
  const rest = line.slice(at + (size ? size.end : amount.end - at)).trim();
  const sign = negative ? -1 : 1;
  return {
    re: amount.value * sign, im: 0, polar: false, complex: false,
    unit: money === 1 && rest === '' ? 'money' : rest === '.' ? '' : rest,
    ...(amount.letter === undefined ? {} : { letter: amount.letter }),
    ...(amount.other === undefined ? {} : { other: amount.other * sign }),
  };
}

/** Wire sizes: 12, #12, 1/0 to 4/0 (0 to -3). */
function readGauge(text: string): Numeral | null {
  const hash = text.startsWith('#') ? 1 : 0;
  const aught = /^([1-4])\/0(?!\d)/.exec(text.slice(hash));
  if (aught) return { value: 1 - Number(aught[1]), whole: true, end: hash + 3 };
  const plain = /^\d{1,2}(?!\d)/.exec(text.slice(hash));
  return plain ? { value: Number(plain[0]), whole: true, end: hash + plain[0].length } : null;
}

type Found = { unit: Unit; given: boolean; power: number } | { trouble: Unread };

const prefixOf = (letter: string) => PREFIXES.find((prefix) => prefix.letter === letter || prefix.symbol === letter || (prefix.letter === 'u' && letter === 'μ') || (prefix.letter === 'k' && letter === 'K'));

/** The unit that the answer was written in: its own, the asked one, or the asked one with the prefix that stands alone (20k). */
function findWritten({ letter, unit }: Typed, asked: Asked): Found {
  const power = letter === undefined ? 0 : (prefixOf(letter)?.exponent ?? 0);
  const base = () => parseUnit(asked.unit.base ?? asked.unit.code) ?? asked.unit;
  if (unit === '') {
    if (letter === 'R') return matching(unitReadings('ohm'), unit, asked, power);
    if (letter !== undefined) return { unit: base(), given: base().code === 'ohm', power };
    return { unit: asked.unit, given: asked.unit.code === 'none', power };
  }
  const bare = unit.replace(/\.$/, '').replace(/\s*[dDaA]\.?[cC]\.?$/, '');
  const readings = [...unitReadings(unit), ...(bare === unit || bare === '' ? [] : unitReadings(bare))];
  const alone = unit.length === 1 && unit !== 'c' ? prefixOf(unit) : undefined;
  if (alone && letter === undefined && !readings.some((reading) => answers(reading, asked.unit))) {
    return { unit: base(), given: base().code === 'ohm', power: alone.exponent };
  }
  return matching(readings, unit, asked, power);
}

function matching(readings: Unit[], written: string, asked: Asked, power: number): Found {
  const unit = readings.find((reading) => answers(reading, asked.unit));
  if (unit) return { unit, given: true, power };
  const wanted = asked.unit.many === '' ? 'a number without unit' : asked.unit.many;
  const [first] = readings;
  const shown = written.length > 24 ? `${written.slice(0, 24)}…` : written;
  if (!first) return { trouble: unread('unit', `“${shown}” is not read as a unit. The answer is asked in ${wanted}${like(asked)}.`) };
  return { trouble: unread('dimension', `An answer in ${first.many === '' ? 'a pure number' : first.many} cannot stand for ${wanted}.`) };
}

function inAskedUnit(typed: Typed, asked: Asked): Reading {
  const found = findWritten(typed, asked);
  if ('trouble' in found) return found.trouble;
  const scale = (value: number) => convert(shift(value, found.power), found.unit, asked.unit);
  const [value, imaginary] = [scale(typed.re), typed.complex || asked.form === 'complex' ? scale(typed.im) : undefined];
  if (!Number.isFinite(value) || !Number.isFinite(imaginary ?? 0)) return unread('unread', 'This number is too large to be read.');
  const asRatio = asked.ratio === true && asked.unit.code === 'percent' && !found.given && Math.abs(value) <= 1 && value !== 0;
  const read = described({ value: asRatio ? shift(value, 2) : value, imaginary, polar: typed.polar }, found.given, asked);
  const other = asRatio ? value : typed.other === undefined ? undefined : scale(typed.other);
  return {
    ...read,
    ...(found.given && typed.unit !== '' ? { unit: found.unit.code } : {}),
    ...(other === undefined ? {} : { says: `${read.says}, not ${inWords(other, asked)}`, ambiguous: { value: other, says: `could also be ${inWords(other, asked)}` } }),
  };
}

const printed = (value: number, { notation, unit }: Asked) =>
  unit.code === 'AWG' && value <= 0 ? `${1 - Math.round(value)}/0` : printShortest(shorter(value), notation);

/** Up to six figures where the digits came out of a conversion; all of them where they are the candidate's own. */
function shorter(value: number): number {
  const full = roundToFigures(value, 12);
  return Math.abs(value - full) <= Math.abs(value) * 1e-15 ? full : roundToFigures(value, 6);
}

const inWords = (value: number, asked: Asked) => `${printed(value, asked)} ${unitInWords(asked.unit, value)}`.trim();

type Whole = { value: number; imaginary: number | undefined; polar: boolean };

function described({ value, imaginary, polar }: Whole, given: boolean, asked: Asked): Read {
  const unit = unitInWords(asked.unit, imaginary === undefined ? value : 2);
  const pure = parseUnit('none') ?? asked.unit;
  const number = imaginary === undefined ? printed(value, asked)
    : (polar ? printPolar : printRectangular)(value, imaginary, 'shortest', pure, asked.notation);
  const missing = !given && asked.unitMissing === 'lose' ? '; the unit is missing' : '';
  return {
    ok: true, value, unitGiven: given,
    ...(imaginary === undefined ? {} : { imaginary }),
    shown: { value: number, unit },
    says: `reads as ${number} ${unit}`.trimEnd() + missing,
  };
}
