import { readNumber } from '@/lib/numeric/reader';
import { type Amount, isFiniteAmount, magnitude, matches } from '../tolerance';
import type { Scope } from './kind';
import { evaluateAmount, printAmount, type Quantity } from './quantity';

/** Published figures are printed with a full stop, wherever the exam is held. */
const published = { decimal: '.' } as const;

/** Compares a key with a published answer such as "1173 rpm", within a share of the published figure. */
export function agreesWith(quantity: Quantity, scope: Scope, answer: string, within: number): true | string {
  const key = evaluateAmount(quantity.key, scope);
  const reading = readNumber(answer, { unit: quantity.unit, notation: published, form: quantity.asked.complex ? 'complex' : 'real' });
  if (!reading.ok) return `"${answer}" cannot be read as a quantity: ${reading.says}`;
  const figure: Amount = quantity.asked.complex ? { re: reading.value, im: reading.imaginary ?? 0 } : reading.value;
  if (key === null || !isFiniteAmount(key)) return `the key cannot be computed where ${answer} was published`;
  if (matches(key, figure, { tolerance: within * magnitude(figure) })) return true;
  return `the key is ${printAmount(key, { ...quantity, precision: { figures: 6 } }, published).text} where ${answer} was published`;
}
