import { z } from 'zod';
import { markNumber } from '@/lib/marking/number';
import { anyPart } from '../model';
import { type Amount, isFiniteAmount } from '../tolerance';
import type { Build, Drawing, DrawnPart, Examiner, Kind, PartPlan } from './kind';
import { buildQuantity, defaultAllowance, drawMissteps, evaluateAmount, printAmount, type Quantity, quantityText, roundValue } from './quantity';
import { agreesWith } from './quantity-example';
import { QuantityExaminer } from './quantity-examiner';

const schema = z.strictObject({ ...anyPart, kind: z.literal('number'), ...quantityText, ratio: z.boolean().default(false) });
type NumberText = z.output<typeof schema>;

/** A value the candidate works out and types with its unit. */
export interface NumberPlan extends PartPlan { readonly quantity: Quantity; readonly ratio: boolean }

const drawNumber = (text: NumberText, quantity: Quantity, { scope, notation }: Drawing): DrawnPart => {
  const value: Amount = evaluateAmount(quantity.key, scope) ?? NaN;
  const finite = isFiniteAmount(value);
  return {
    part: text.part,
    kind: 'number',
    marks: text.marks,
    key: { value, text: finite ? printAmount(value, quantity, notation).text : 'not a number' },
    carries: value,
    unit: quantity.unit.code,
    accept: finite ? defaultAllowance(quantity, value) : { tolerance: 0 },
    missteps: drawMissteps(quantity, scope, notation),
  };
};

const examinerOf = (quantity: Quantity, figuresGiven: boolean): Examiner => {
  const examiner = new QuantityExaminer(quantity, figuresGiven);
  return {
    look: (sight, rounded, note) => examiner.look(sight, sight.drawn, evaluateAmount(quantity.key, sight.scope), rounded, note),
    finish: () => examiner.finish(),
  };
};

function build(text: NumberText, around: Build): NumberPlan | null {
  const quantity = buildQuantity(text, text.marks, around);
  if (quantity === null) return null;
  if (text.ratio && quantity.unit.code !== 'percent') around.complain('schema', 'ratio: true is for parts in percent.', ['ratio']);
  const plan: NumberPlan = {
    part: text.part,
    kind: 'number',
    ask: text.ask,
    marks: text.marks,
    working: text.working ?? false,
    unit: quantity.unit,
    uses: quantity.key.parts,
    quantity,
    ratio: text.ratio,
    value: (scope) => quantity.key.evaluate(scope),
    roundedValue: (scope, figures) => roundValue(quantity.key.evaluate(scope), figures),
    draw: (drawing) => drawNumber(text, quantity, drawing),
    print: (amount, notation) => printAmount(amount, quantity, notation),
    see: () => ({
      ...(text.decimals === undefined ? { figures: text.figures } : { decimals: text.decimals }),
      unit: quantity.unit.code, ratio: text.ratio, form: text.form,
    }),
    examiner: () => examinerOf(quantity, text.figures !== undefined),
    mark: (marking) => markNumber(plan, marking),
    agrees: (scope, answer, within) => agreesWith(quantity, scope, answer, within),
  };
  return plan;
}

export const numberKind: Kind<typeof schema> = { kind: 'number', schema, build };
