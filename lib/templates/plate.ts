import { notationOf } from '@/lib/numeric/notation';
import { printNumber } from '@/lib/numeric/printer';
import type { Unit } from '@/lib/numeric/units';
import type { Draw } from './draw';
import type { Template } from './plan';

/** One cell of the rating plate: `symbol` as written (R_a), number and unit's symbol apart. */
export interface Cell { label: string; symbol: string; value: string; unit: string }

/** Wire sizes and money carry their unit inside the number. */
const apart = (unit: Unit): boolean => unit.code !== 'AWG' && unit.code !== 'money' && unit.code !== 'none';

/** What was drawn, in the order of the template: the givens, and derived values that are declared with a label. */
export function plateOf(template: Template, draw: Draw): Cell[] {
  const notation = notationOf(draw.locale);
  const cell = (label: string, symbol: string, unit: Unit, value: number | string, precision: { decimals: number } | { figures: number }, text: string): Cell =>
    typeof value === 'number' && apart(unit)
      ? { label, symbol, value: printNumber(value, precision, notation), unit: unit.symbol }
      : { label, symbol, value: text, unit: '' };
  const givens = template.plan.givens.flatMap(({ name, label, symbol, unit }) => {
    const drawn = draw.given[name];
    return drawn === undefined ? [] : [cell(label, symbol, unit, drawn.value, { decimals: drawn.decimals }, drawn.text)];
  });
  const derived = template.plan.derived.flatMap(({ name, declared }) => {
    const drawn = draw.derived[name];
    if (!declared?.label || drawn?.text === undefined || typeof drawn.value !== 'number') return [];
    return [cell(declared.label, declared.symbol ?? (name.length === 1 ? name : ''), declared.unit, drawn.value, declared.precision, drawn.text)];
  });
  return [...givens, ...derived];
}
