import { isComparison, textOf } from './tree';
import type { Tree } from './tree';

type Kind = 'number' | 'truth' | 'text' | 'unknown';

const ARITHMETIC: readonly string[] = ['+', '-', '*', '/', '^'];

function kindOf(tree: Tree): Kind {
  if (tree.is === 'number' || tree.is === 'constant') return 'number';
  if (tree.is === 'truth' || tree.is === 'text') return tree.is;
  if (tree.is === 'unary') return tree.sign === 'not' ? 'truth' : 'number';
  if (tree.is === 'binary') return ARITHMETIC.includes(tree.sign) ? 'number' : 'truth';
  if (tree.is === 'choose') return kindOf(tree.yes) === kindOf(tree.no) ? kindOf(tree.yes) : 'unknown';
  if (tree.is === 'call') return tree.name === 'between' ? 'truth' : 'number';
  return 'unknown';
}

const wrong = (tree: Tree, wanted: Kind): string | null => {
  const kind = kindOf(tree);
  if (kind === 'unknown' || kind === wanted) return null;
  return wanted === 'truth' ? `${textOf(tree)} is no comparison, and a yes or no is needed there.` : `${textOf(tree)} is no number, and a number is needed there.`;
};

const firstOf = (...problems: (string | null)[]) => problems.find((problem) => problem !== null) ?? null;

function here(tree: Tree): string | null {
  if (tree.is === 'unary') return wrong(tree.of, tree.sign === 'not' ? 'truth' : 'number');
  if (tree.is === 'choose') return wrong(tree.test, 'truth');
  if (tree.is === 'call') return firstOf(...tree.args.map((arg) => wrong(arg, 'number')));
  if (tree.is !== 'binary' || tree.sign === '==' || tree.sign === '!=') return null;
  const wanted = ARITHMETIC.includes(tree.sign) || isComparison(tree.sign) ? 'number' : 'truth';
  return firstOf(wrong(tree.left, wanted), wrong(tree.right, wanted));
}

/** The first place where a number stands for a yes or no, or the reverse; null where none does. */
export function kindProblem(tree: Tree): string | null {
  if (tree.is === 'unary') return firstOf(here(tree), kindProblem(tree.of));
  if (tree.is === 'binary') return firstOf(here(tree), kindProblem(tree.left), kindProblem(tree.right));
  if (tree.is === 'choose') return firstOf(here(tree), kindProblem(tree.test), kindProblem(tree.yes), kindProblem(tree.no));
  return tree.is === 'call' ? firstOf(here(tree), ...tree.args.map(kindProblem)) : null;
}
