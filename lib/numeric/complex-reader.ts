import { scanNumeral, skipSpaces } from './numerals';
import type { Typed } from './numerals';
import type { Notation } from './notation';

const ANGLES = ['∠', '/_', '@', '<'];

/** Without brackets round the number: (9.9 - j7.4) A. */
function unbracket(line: string): string {
  const close = line.indexOf(')');
  return line.startsWith('(') && close > 0 ? `${line.slice(1, close)} ${line.slice(close + 1)}` : line;
}

type Signed = { sign: number; at: number };

function scanSign(text: string, at: number): Signed {
  const start = skipSpaces(text, at);
  const sign = text[start] === '-' ? -1 : 1;
  return { sign, at: text[start] === '-' || text[start] === '+' ? skipSpaces(text, start + 1) : start };
}

const isImaginary = (sign: string | undefined) => sign === 'j' || sign === 'i';

/** ±jX or ±Xj from `at` on; null where none stands there. */
function scanImaginary(text: string, at: number, notation: Notation): { value: number; end: number } | null {
  const { sign, at: start } = scanSign(text, at);
  if (isImaginary(text[start])) {
    const number = scanNumeral(text, skipSpaces(text, start + 1), notation);
    return number && number.letter === undefined ? { value: sign * number.value, end: number.end } : null;
  }
  const number = scanNumeral(text, start, notation);
  if (!number || number.letter !== undefined) return null;
  const unit = text[number.end + 1];
  const alone = unit === undefined || !/[A-Za-z]/.test(unit);
  return isImaginary(text[number.end]) && alone ? { value: sign * number.value, end: number.end + 1 } : null;
}

function polar(line: string, notation: Notation): Typed | null {
  const mark = ANGLES.find((sign) => line.includes(sign));
  if (mark === undefined) return null;
  const place = line.indexOf(mark);
  const { sign, at } = scanSign(line, 0);
  const size = scanNumeral(line, at, notation);
  if (!size || size.end > place) return null;
  const before = line.slice(size.end, place).trim();
  const turn = scanSign(line, place + mark.length);
  const angle = scanNumeral(line, turn.at, notation);
  if (!angle || angle.letter !== undefined) return null;
  const rest = line.slice(angle.end).trim();
  const measure = /^(°|degrees|degree|deg|rad)(?![A-Za-z])/.exec(rest)?.[0] ?? '';
  const after = rest.slice(measure.length).trim();
  if (before !== '' && after !== '') return null;
  const radians = turn.sign * angle.value * (measure === 'rad' ? 1 : Math.PI / 180);
  const length = sign * size.value;
  return {
    re: length * Math.cos(radians), im: length * Math.sin(radians), polar: true, complex: true, unit: before + after,
    ...(size.letter === undefined ? {} : { letter: size.letter }),
  };
}

function rectangular(line: string, notation: Notation): Typed | null {
  const alone = scanImaginary(line, 0, notation);
  if (alone) return { re: 0, im: alone.value, polar: false, complex: true, unit: line.slice(alone.end).trim() };
  const { sign, at } = scanSign(line, 0);
  const real = scanNumeral(line, at, notation);
  const next = real ? skipSpaces(line, real.end) : 0;
  if (!real || real.letter !== undefined || (line[next] !== '-' && line[next] !== '+')) return null;
  const imaginary = scanImaginary(line, next, notation);
  if (!imaginary) return null;
  return { re: sign * real.value, im: imaginary.value, polar: false, complex: true, unit: line.slice(imaginary.end).trim() };
}

/** A complex number in polar (12.4∠-36.9° A) or rectangular form (9.9-j7.4 A); null where the text is neither. */
export function readComplex(line: string, notation: Notation): Typed | null {
  const open = unbracket(line);
  return polar(open, notation) ?? rectangular(open, notation);
}
