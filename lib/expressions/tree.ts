export type UnarySign = '-' | '+' | 'not';
export type Comparison = '==' | '!=' | '<' | '>' | '<=' | '>=';
export type BinarySign = '+' | '-' | '*' | '/' | '^' | 'and' | 'or' | Comparison;

/** An expression after it was let through: nothing stands in it that is not named here. */
export type Tree =
  | { is: 'number'; value: number }
  | { is: 'truth'; value: boolean }
  | { is: 'text'; value: string }
  | { is: 'constant'; name: 'pi' | 'e' | 'i' }
  | { is: 'name'; name: string }
  | { is: 'part'; part: string }
  | { is: 'unary'; sign: UnarySign; of: Tree }
  | { is: 'binary'; sign: BinarySign; left: Tree; right: Tree }
  | { is: 'choose'; test: Tree; yes: Tree; no: Tree }
  | { is: 'call'; name: string; args: Tree[] };

const COMPARISONS: readonly string[] = ['==', '!=', '<', '>', '<=', '>='];
export const isComparison = (sign: BinarySign): sign is Comparison => COMPARISONS.includes(sign);

/** What stands directly in a tree. */
export function childrenOf(tree: Tree): Tree[] {
  if (tree.is === 'unary') return [tree.of];
  if (tree.is === 'binary') return [tree.left, tree.right];
  if (tree.is === 'choose') return [tree.test, tree.yes, tree.no];
  return tree.is === 'call' ? tree.args : [];
}

/** Whether a tree depends on no name and no part. */
export const isFixed = (tree: Tree): boolean => tree.is !== 'name' && tree.is !== 'part' && childrenOf(tree).every(isFixed);

const inner = (tree: Tree) => (tree.is === 'binary' || tree.is === 'choose' ? `(${textOf(tree)})` : textOf(tree));

/** A tree in writing, for messages. */
export function textOf(tree: Tree): string {
  if (tree.is === 'number' || tree.is === 'truth') return String(tree.value);
  if (tree.is === 'text') return JSON.stringify(tree.value);
  if (tree.is === 'constant' || tree.is === 'name') return tree.name;
  if (tree.is === 'part') return `part.${tree.part}`;
  if (tree.is === 'unary') return `${tree.sign}${tree.sign === 'not' ? ' ' : ''}${inner(tree.of)}`;
  if (tree.is === 'binary') return `${inner(tree.left)} ${tree.sign} ${inner(tree.right)}`;
  if (tree.is === 'choose') return `${inner(tree.test)} ? ${inner(tree.yes)} : ${inner(tree.no)}`;
  return `${tree.name}(${tree.args.map(textOf).join(', ')})`;
}
