import { ExpressionError, type Value } from '@/lib/expressions/compile';
import { readNumber } from '@/lib/numeric/reader';
import type { Scope } from './kinds/kind';
import type { ExampleText } from './model';
import type { GivenPlan, Template } from './plan';
import { type Problem, textProblem } from './problem';
import { addKeys, derive } from './values';

/** The value an example gives: a number in the given's unit, a text with a unit of its own, or a word. */
const givenValue = ({ unit, from }: GivenPlan, stated: number | string): Value | null => {
  if (typeof stated === 'number') return stated;
  if ('choices' in from && typeof from.choices.at(0).value === 'string') return stated;
  const reading = readNumber(stated, { unit, notation: { decimal: '.' } });
  return reading.ok ? reading.value : 'column' in from ? stated : null;
};

const scopeOfExample = (template: Template, example: ExampleText): Scope | string => {
  const scope: Scope = { values: {}, parts: {} };
  for (const given of template.plan.givens) {
    const value = givenValue(given, example.given[given.name] ?? '');
    if (value === null) return `"${example.given[given.name] ?? ''}" cannot be read as ${given.name}`;
    scope.values[given.name] = value;
  }
  derive(template.plan, scope);
  addKeys(template.plan, scope);
  return scope;
};

const faultsOf = (template: Template, example: ExampleText): { part?: string; says: string }[] => {
  try {
    const scope = scopeOfExample(template, example);
    if (typeof scope === 'string') return [{ says: scope }];
    return template.plan.parts.flatMap((plan) => {
      const published = example.expect[plan.part];
      if (published === undefined) return [];
      const agrees = plan.agrees(scope, String(published), example.within);
      return agrees === true ? [] : [{ part: plan.part, says: agrees }];
    });
  } catch (error) {
    if (!(error instanceof ExpressionError)) throw error;
    return [{ says: `a formula has no value there: ${error.message}` }];
  }
};

/**
 * Holds the template against its published examples: the keys from the example's givens, within its share of each
 * published figure. Requirements and ranges are not asked of an example.
 */
export const checkExamples = (template: Template): Problem[] =>
  template.head.examples.flatMap((example) =>
    faultsOf(template, example).map(({ part, says }) => textProblem('example', `The example of ${example.source} is not reproduced: ${says}.`, part === undefined ? {} : { part })));
