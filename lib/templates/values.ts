import type { Value } from '@/lib/expressions/compile';
import { roundToDecimals, roundToFigures } from '@/lib/numeric/digits';
import { streamOf } from '@/lib/numeric/stream';
import { type Refusal, refuse, type Success } from '@/lib/result';
import type { Scope } from './kinds/kind';
import type { DerivedPlan, Plan, Template } from './plan';

/** Draws thrown away before a template is given up. */
export const mostRedraws = 500;

/** The values of one draw: `decimals` are those each number given prints with, `redraws` the draws thrown away before. */
export interface DrawnValues { redraws: number; scope: Scope; decimals: Record<string, number> }
export type ValuesRefusal = Refusal<'requirement-never'> & { failures: number[] };

const drawGivens = (plan: Plan, seed: string, redraw: number, values: Record<string, Value>, decimals: Record<string, number>): void => {
  const { table } = plan;
  const row = table === null ? undefined : table.rows[Math.floor(streamOf(seed, `plate:${table.table}`, redraw)() * table.rows.length)];
  for (const given of plan.givens) {
    if ('choices' in given.from) {
      const { choices } = given.from;
      const chosen = choices.at(Math.floor(streamOf(seed, given.name, redraw)() * choices.count));
      values[given.name] = chosen.value;
      decimals[given.name] = chosen.decimals;
    } else {
      values[given.name] = row?.[given.from.column] ?? NaN;
    }
  }
};

const roundDeclared = (value: Value, { declared }: DerivedPlan): Value => {
  if (declared === null || typeof value !== 'number' || !Number.isFinite(value)) return value;
  return 'decimals' in declared.precision ? roundToDecimals(value, declared.precision.decimals) : roundToFigures(value, declared.precision.figures);
};

/** Adds the derived values to the givens already in the scope, each declared one rounded as it is printed. */
export function derive(plan: Plan, scope: Scope): void {
  for (const derived of plan.derived) {
    const value = derived.expression.evaluate(scope);
    scope.values[derived.name] = derived.declared === null ? value : roundDeclared(value, derived);
  }
}

/** As `derive`, with every value that is not printed rounded to so many significant figures, as honest work rounds. */
export function deriveRounded(plan: Plan, scope: Scope, figures: number, drawn: Record<string, Value>): void {
  for (const derived of plan.derived) {
    const value = derived.declared === null ? derived.expression.evaluate(scope) : (drawn[derived.name] ?? NaN);
    scope.values[derived.name] = derived.declared === null && typeof value === 'number' && Number.isFinite(value) ? roundToFigures(value, figures) : value;
  }
}

/** Adds the key of each part to the scope, in their order, so that later keys may use earlier ones. */
export function addKeys(plan: Plan, scope: Scope): void {
  for (const part of plan.parts) {
    const value = part.value(scope);
    if (value !== undefined) scope.parts[part.part] = value;
  }
}

/**
 * Draws the givens of a template from its seed, derives and tests the requirements, again until all hold. `failures`
 * counts how often each requirement, in the order written, threw a draw away.
 */
export function drawValues(template: Template, seed: string, failures?: number[]): (Success<DrawnValues> | ValuesRefusal) {
  const { plan } = template;
  const failed = failures ?? plan.requirements.map(() => 0);
  for (let redraw = 0; redraw <= mostRedraws; redraw += 1) {
    const scope: Scope = { values: {}, parts: {} };
    const decimals: Record<string, number> = {};
    drawGivens(plan, seed, redraw, scope.values, decimals);
    derive(plan, scope);
    const broken = plan.requirements.findIndex(({ expression }) => expression.evaluate(scope) !== true);
    if (broken < 0) return { ok: true, value: { redraws: redraw, scope, decimals } };
    failed[broken] = (failed[broken] ?? 0) + 1;
  }
  const worst = plan.requirements[failed.indexOf(Math.max(...failed))]?.source ?? '';
  return { ...refuse('requirement-never', `No draw held all requirements in ${mostRedraws} tries; "${worst}" failed most: loosen it or change the givens.`), failures: failed };
}
