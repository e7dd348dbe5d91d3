import { PREFIXES } from './units-table';
import type { Notation } from './notation';

/**
 * A number as it was typed. `value` without the letter's power; `letter`: R or a prefix that stood in the place of the
 * decimal mark (4R7, 1k5); `other`: what it would be if its mark were the other kind; `end`: place after its last sign.
 */
export type Numeral = { value: number; whole: boolean; end: number; letter?: string; other?: number };

/** What was typed, before it is held against what is asked. `im`: the imaginary part; `other`: the number with the other mark; `unit`: what stands after it. */
export type Typed = { re: number; im: number; polar: boolean; complex: boolean; other?: number; letter?: string; unit: string };

const LETTERS = new Set(['R', 'K', ...PREFIXES.filter((prefix) => prefix.letter !== 'c').map((prefix) => prefix.letter)]);
const RAISED = '⁰¹²³⁴⁵⁶⁷⁸⁹';

export const isDigit = (sign: string | undefined): boolean => sign !== undefined && sign >= '0' && sign <= '9';
export const isSpace = (sign: string | undefined): boolean => sign !== undefined && /\s/.test(sign);

/** The place of the first sign from `at` on that is no space. */
export function skipSpaces(text: string, at: number): number {
  let next = at;
  while (isSpace(text[next])) next += 1;
  return next;
}

function digitsEnd(text: string, at: number): number {
  let end = at;
  while (isDigit(text[end])) end += 1;
  return end;
}

type Groups = { groups: string[]; marks: string[]; end: number };

const isMark = (sign: string | undefined) => sign === '.' || sign === ',';

/** Digits with what stands between them: marks, and spaces or apostrophes before exactly three digits. */
function scanGroups(text: string, start: number): Groups {
  let end = digitsEnd(text, start);
  const groups = [text.slice(start, end)];
  const marks: string[] = [];
  for (;;) {
    const sign = text[end];
    const next = digitsEnd(text, end + 1);
    const count = next - end - 1;
    const gap = (isSpace(sign) || sign === "'" || sign === '’') && count === 3 && (groups.at(-1) ?? '').length <= 3;
    if (!(gap && !marks.some((mark, i) => isMark(mark) && i === marks.length - 1)) && !(isMark(sign) && count > 0)) break;
    marks.push(gap ? ' ' : (sign ?? ''));
    groups.push(text.slice(end + 1, next));
    end = next;
  }
  return { groups, marks, end };
}

const grouped = (groups: string[]) => groups.every((group, i) => (i === 0 ? group.length >= 1 && group.length <= 3 : group.length === 3));

type Split = { whole: string; rest: string; other?: string };

/** Which mark is the decimal one: the last of two kinds, or what the notation says; null where no reading fits. */
function split({ groups, marks }: Groups, notation: Notation): Split | null {
  const points = marks.filter(isMark);
  const last = marks.at(-1);
  const whole = groups.slice(0, -1);
  const rest = groups.at(-1) ?? '';
  const asGroups = grouped(groups) ? { whole: groups.join(''), rest: '' } : null;
  if (points.length === 0) return asGroups ?? (groups.length === 1 ? { whole: rest, rest: '' } : null);
  const single = points.filter((mark) => mark === last).length === 1;
  const asDecimal = single && isMark(last) && (whole.length === 1 || grouped(whole)) ? { whole: whole.join(''), rest } : null;
  if (marks.length > 1) return asDecimal ?? (new Set(marks).size === 1 ? asGroups : null);
  if (last === notation.decimal || !asGroups || groups[0]?.startsWith('0')) return asDecimal;
  return { ...asGroups, other: `${groups[0]}.${rest}` };
}

/** e3, E-3, ×10^3, x10³ after a number: its exponent and the place after it. */
function scanExponent(text: string, at: number): { exponent: string; end: number } | null {
  if (text[at] === 'e' || text[at] === 'E') return scanSigned(text, at + 1);
  const times = skipSpaces(text, at);
  if (!['×', 'x', 'X', '*', '·'].includes(text[times] ?? '')) return null;
  const ten = skipSpaces(text, times + 1);
  if (text.slice(ten, ten + 2) !== '10') return null;
  const power = ten + 2;
  if (text[power] === '^') return scanSigned(text, power + 1);
  if (text.slice(power, power + 2) === '**') return scanSigned(text, power + 2);
  let end = power;
  let exponent = '';
  while (RAISED.includes(text[end] ?? ' ') || (end === power && text[end] === '⁻')) {
    exponent += text[end] === '⁻' ? '-' : RAISED.indexOf(text[end] ?? '');
    end += 1;
  }
  return isDigit(exponent.at(-1)) ? { exponent, end } : null;
}

function scanSigned(text: string, at: number): { exponent: string; end: number } | null {
  const start = text[at] === '-' || text[at] === '+' ? at + 1 : at;
  const end = digitsEnd(text, start);
  return end === start || end - start > 4 ? null : { exponent: text.slice(at, end), end };
}

/** Reads the number that starts at `start` (no sign before it); null where none does. Linear in the length of the text. */
export function scanNumeral(text: string, start: number, notation: Notation): Numeral | null {
  const leading = text[start] === 'R' && isDigit(text[start + 1]);
  if (!leading && !isDigit(text[start]) && !(isMark(text[start]) && isDigit(text[start + 1]))) return null;
  const scanned = leading ? { groups: [''], marks: [], end: start } : scanGroups(text, start);
  const letter = text[scanned.end] ?? '';
  if (LETTERS.has(letter) && isDigit(text[scanned.end + 1]) && !scanned.marks.some(isMark)) {
    const end = digitsEnd(text, scanned.end + 1);
    const value = Number(`${scanned.groups.join('') || '0'}.${text.slice(scanned.end + 1, end)}`);
    return { value, whole: false, end, letter };
  }
  const parts = split(scanned, notation);
  if (!parts) return null;
  const power = scanExponent(text, scanned.end);
  const scale = power ? `e${power.exponent}` : '';
  const number: Numeral = {
    value: Number(`${parts.whole || '0'}.${parts.rest || '0'}${scale}`),
    whole: parts.rest === '' && !power,
    end: power?.end ?? scanned.end,
  };
  return parts.other === undefined ? number : { ...number, other: Number(parts.other + scale) };
}

/** Reads a number, a fraction (2/3) or a mixed number (1 1/2) that starts at `start`. */
export function scanAmount(text: string, start: number, notation: Notation): Numeral | null {
  const first = scanNumeral(text, start, notation);
  if (!first || first.letter !== undefined) return first;
  const slash = skipSpaces(text, first.end);
  if (text[slash] === '/') {
    const below = scanNumeral(text, skipSpaces(text, slash + 1), notation);
    if (!below || below.letter !== undefined) return first;
    return { value: first.value / below.value, whole: false, end: below.end };
  }
  if (!first.whole || slash === first.end || !isDigit(text[slash])) return first;
  const end = digitsEnd(text, slash);
  const below = text[end] === '/' ? digitsEnd(text, end + 1) : end;
  const [above, under] = [Number(text.slice(slash, end)), Number(text.slice(end + 1, below))];
  return below > end + 1 && above < under ? { value: first.value + above / under, whole: false, end: below } : first;
}
