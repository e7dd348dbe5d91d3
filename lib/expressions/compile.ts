import { toPlain } from './arithmetic';
import type { Run, Scope, Value } from './arithmetic';
import { runOf } from './run';
import { parseExpression } from './parse';
import type { ExpressionResult, Names } from './parse';
import { childrenOf } from './tree';
import type { Tree } from './tree';
import { kindProblem } from './kinds';

export type { Complex, Scope, Value } from './arithmetic';
export { ExpressionError, isComplex } from './arithmetic';
export type { ExpressionRefusal, ExpressionResult, Names } from './parse';

/** An expression that was let through. `names` and `parts` are those that it uses, each once. */
export type Expression = {
  source: string;
  names: string[];
  parts: string[];
  tree: Tree;
  /** Its value for a scope. Throws ExpressionError where a value is missing or of the wrong kind; NaN and infinities are returned. */
  evaluate: (scope: Scope) => Value;
};

function collect(tree: Tree, names: Set<string>, parts: Set<string>): void {
  if (tree.is === 'name') names.add(tree.name);
  if (tree.is === 'part') parts.add(tree.part);
  for (const child of childrenOf(tree)) collect(child, names, parts);
}

const evaluation = (run: Run) => (scope: Scope): Value => {
  const value = run(scope);
  return typeof value === 'number' ? value : toPlain(value);
};

/**
 * Reads an expression once, to be evaluated many times. Refused with `name` (it does not parse, holds something that is
 * not allowed, or names something unknown; with the place and the nearest known name) or `schema` (a function of a later
 * version of the language).
 */
export function compile(source: string, names: Names): ExpressionResult<Expression> {
  const parsed = parseExpression(source, names);
  if (!parsed.ok) return parsed;
  const tree = parsed.value;
  const wrong = kindProblem(tree);
  if (wrong !== null) return { ok: false, code: 'name', says: wrong, at: 0 };
  const [used, parts] = [new Set<string>(), new Set<string>()];
  collect(tree, used, parts);
  return { ok: true, value: { source, names: [...used], parts: [...parts], tree, evaluate: evaluation(runOf(tree)) } };
}
