import { markChoice } from '@/lib/marking/choice';
import { decimalsOf } from '@/lib/numeric/digits';
import { type Amount, distance, isFiniteAmount, magnitude, matches } from '../tolerance';
import type { Build, DrawnOption, Drawing, DrawnPart, Examiner } from './kind';
import { type ChoicePlan, keyOf, shuffled } from './options';
import { buildQuantity, defaultAllowance, evaluateAmount, printAmount, type Quantity, type QuantityText, roundValue } from './quantity';
import { agreesWith } from './quantity-example';
import { QuantityExaminer } from './quantity-examiner';

type ComputedText = QuantityText & { part: string; ask: string; marks: number; working?: boolean };

/**
 * Options are formatted alike: all with the decimals that give the smallest of them its figures, so that the number of
 * decimals does not point to the key.
 */
const alike = (quantity: Quantity, amounts: readonly Amount[]): Quantity['precision'] => {
  if ('decimals' in quantity.precision) return quantity.precision;
  const { figures } = quantity.precision;
  const sizes = amounts.filter(isFiniteAmount).map(magnitude).filter((size) => size > 0);
  const smallest = sizes.length === 0 ? 1 : Math.min(...sizes);
  return { decimals: Math.min(8, Math.max(0, figures - decimalsOf(smallest).point)) };
};

const drawComputed = (text: ComputedText, quantity: Quantity, drawing: Drawing): DrawnPart => {
  const key: Amount = evaluateAmount(quantity.key, drawing.scope) ?? NaN;
  const wrong = quantity.missteps.map((misstep) => ({ ...misstep, value: evaluateAmount(misstep.key, drawing.scope) ?? NaN }));
  const precision = alike(quantity, [key, ...wrong.map(({ value }) => value)]);
  const show = (value: Amount) => (isFiniteAmount(value) ? printAmount(value, { ...quantity, precision }, drawing.notation).text : 'not a number');
  const all: Omit<DrawnOption, 'option'>[] = [
    { text: show(key), right: true, source: 0, value: key },
    ...wrong.map(({ value, says, earns }, index) => ({ text: show(value), right: false, source: index + 1, value, says, ...(earns === 0 ? {} : { earns }) })),
  ];
  const options = shuffled(text.part, all, drawing);
  return {
    part: text.part, kind: 'choice', marks: text.marks, key: keyOf(options), carries: key, unit: quantity.unit.code,
    accept: isFiniteAmount(key) ? defaultAllowance(quantity, key) : { tolerance: 0 }, options, missteps: [],
  };
};

const examinerOf = (quantity: Quantity): Examiner => {
  // Nothing is typed, so no tolerance has to hold off missteps or let rounding in; the options' own distance counts.
  const examiner = new QuantityExaminer({ ...quantity, missteps: [] }, true);
  return {
    look(sight, rounded, note) {
      const options = sight.drawn.options ?? [];
      const key = evaluateAmount(quantity.key, sight.scope);
      examiner.look(sight, sight.drawn, key, rounded, note);
      if (key === null || !isFiniteAmount(key)) return;
      if (options.some(({ value }) => value === undefined || !isFiniteAmount(value))) note('not-finite', 'A misstep among the options is infinite or not a number.');
      const gap = 2 * defaultAllowance(quantity, key).tolerance;
      const close = options.some((one, index) => options.slice(index + 1).some((other) =>
        one.text === other.text || (one.value !== undefined && other.value !== undefined && distance(one.value, other.value) <= gap)));
      if (close) note('options-close', 'Two options are nearer than two tolerances or printed alike: require a larger difference.');
    },
    finish: () => examiner.finish().filter(({ code }) => code !== 'window'),
  };
};

/** Makes a choice ready whose options are its key and its missteps, all formatted alike. */
export function buildComputed(text: ComputedText, build: Build): ChoicePlan | null {
  const quantity = buildQuantity(text, text.marks, build);
  if (quantity === null) return null;
  if (text.missteps.length === 0) build.complain('schema', 'Computed options come from the key and the missteps: write at least one misstep.', ['missteps']);
  const plan: ChoicePlan = {
    part: text.part, kind: 'choice', ask: text.ask, marks: text.marks, working: text.working ?? false, unit: quantity.unit, uses: quantity.key.parts,
    value: (scope) => quantity.key.evaluate(scope),
    roundedValue: (scope, figures) => roundValue(quantity.key.evaluate(scope), figures),
    draw: (drawing) => drawComputed(text, quantity, drawing),
    print: (amount, notation) => printAmount(amount, quantity, notation),
    see: (drawn, render) => ({ options: (drawn.options ?? []).map((option) => ({ option: option.option, html: render(option.text, false) })) }),
    examiner: () => examinerOf(quantity),
    rightFor: (scope, drawn) => {
      const key = evaluateAmount(quantity.key, scope);
      if (key === null || !isFiniteAmount(key)) return [];
      return (drawn.options ?? []).filter(({ value }) => value !== undefined && matches(value, key, defaultAllowance(quantity, key))).map(({ source }) => source);
    },
    mark: (marking) => markChoice(plan, marking),
    agrees: (scope, published, within) => agreesWith(quantity, scope, published, within),
  };
  return plan;
}
