import { shuffle } from '@/lib/numeric/stream';
import type { Drawing, DrawnOption, DrawnPart, PartPlan, Scope } from './kind';

/** The candidate takes one option of several. */
export interface ChoicePlan extends PartPlan {
  /** `source` of each option that is right for these values */
  rightFor(scope: Scope, drawn: DrawnPart): number[];
}

/** Options in an order of the part's own stream, lettered; never sorted, since order would tell the key's rank. */
export const shuffled = (part: string, options: readonly Omit<DrawnOption, 'option'>[], drawing: Drawing): DrawnOption[] =>
  shuffle(options, drawing.stream(`options:${part}`)).map((option, index) => ({ option: String.fromCharCode(65 + index), ...option }));

/** The key as stored on a draw: the letter of the right option, and its text. */
export const keyOf = (options: readonly DrawnOption[]): DrawnPart['key'] => {
  const right = options.find((option) => option.right);
  return right === undefined ? { value: '', text: 'no right option' } : { value: right.option, text: right.text };
};
