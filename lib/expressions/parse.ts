import { parse as parseMath } from './mathjs';
import type { MathNode } from './mathjs';
import { CONSTANTS, FUNCTION_NAMES, MACHINE_FUNCTIONS, functionOf } from './functions';
import { nearest, suggestion } from './nearest';
import { refuse } from '@/lib/result';
import type { Refusal, Result } from '@/lib/result';
import type { BinarySign, Tree } from './tree';

/** What an expression may name: givens and derived values, and the parts that stand before it. */
export type Names = { values: ReadonlySet<string>; parts: ReadonlySet<string> };

/** `at`: place in the source, from 0. */
export type ExpressionRefusal = Refusal<'name' | 'schema'> & { at: number };
export type ExpressionResult<Value> = Exclude<Result<Value>, { ok: false }> | ExpressionRefusal;

export const LONGEST_EXPRESSION = 1000;
export const MOST_NODES = 400;
const DEEPEST = 40;

/** Leaves the walk at the first thing that is not let through. Never leaves this module. */
class Stop extends Error {
  constructor(readonly code: 'name' | 'schema', readonly says: string, readonly word: string) {
    super(says);
  }
}

type Walk = { names: Names; nodes: number };

const BINARY: Readonly<Record<string, BinarySign>> = {
  add: '+', subtract: '-', multiply: '*', divide: '/', pow: '^', and: 'and', or: 'or',
  equal: '==', unequal: '!=', smaller: '<', larger: '>', smallerEq: '<=', largerEq: '>=',
};
const FORBIDDEN: Readonly<Record<string, string>> = {
  AssignmentNode: 'An expression assigns nothing; compare with ==.',
  FunctionAssignmentNode: 'An expression defines no functions.',
  BlockNode: 'Write one expression only.',
  ObjectNode: 'Braces have no meaning here.',
  RangeNode: 'A colon has no meaning here without a question mark before it.',
  IndexNode: 'Square brackets after a name have no meaning here.',
};

const children = (node: MathNode): MathNode[] => {
  const found: MathNode[] = [];
  node.forEach((child) => found.push(child));
  return found;
};

const stop = (says: string, word = ''): never => {
  throw new Stop('name', says, word);
};

function constant(value: unknown): Tree {
  if (typeof value === 'boolean') return { is: 'truth', value };
  if (typeof value === 'string') return stop('Text stands only beside == or !=.', value);
  if (typeof value !== 'number' || !Number.isFinite(value)) return stop('This is not a finite number.', String(value));
  return { is: 'number', value };
}

function symbol(name: string, { names }: Walk): Tree {
  const fixed = CONSTANTS.find((known) => known === name);
  if (fixed) return { is: 'constant', name: fixed };
  if (names.values.has(name)) return { is: 'name', name };
  if (functionOf(name)) return stop(`${name} needs brackets round what it is applied to.`, name);
  if (name === 'part') return stop('Write part. and the letter of an earlier part.', name);
  return stop(`There is no ${name} here.${suggestion(name, [...names.values, ...CONSTANTS])}`, name);
}

function accessor(node: MathNode, { names }: Walk): Tree {
  const [object, index] = children(node);
  const field = node.name ?? '';
  if (object?.type === 'FunctionNode' && MACHINE_FUNCTIONS.has(object.name ?? '')) return machine(object.name ?? '');
  if (object?.type !== 'SymbolNode' || object.name !== 'part' || !index?.dotNotation || field === '') {
    return stop('A point or a bracket after a name stands only in part.<letter>.', object?.name ?? '');
  }
  if (names.parts.has(field)) return { is: 'part', part: field };
  return stop(`There is no earlier part ${field}.${suggestion(field, names.parts)}`, `part.${field}`);
}

const machine = (name: string): never => {
  throw new Stop('schema', `${name}(…) describes a machine, which this version of the language does not compute yet.`, name);
};

function call(node: MathNode, walk: Walk): Tree {
  const name = node.fn && typeof node.fn !== 'string' && node.fn.type === 'SymbolNode' ? (node.fn.name ?? '') : '';
  if (MACHINE_FUNCTIONS.has(name)) return machine(name);
  const known = functionOf(name);
  if (!known) {
    const meant = nearest(name, FUNCTION_NAMES);
    return stop(name === '' ? 'Only a named function has brackets after it.' : `There is no function ${name} here.${meant === null ? '' : ` Did you mean ${meant}?`}`, name);
  }
  const lists = (name === 'min' || name === 'max') && node.args?.length === 1 && node.args[0]?.type === 'ArrayNode';
  const given = lists && node.args?.[0] ? children(node.args[0]) : (node.args ?? []);
  if (given.length < known.least || given.length > known.most) {
    const wanted = known.least === known.most ? `${known.least}` : `${known.least} to ${known.most}`;
    stop(`${name} takes ${wanted} value${wanted === '1' ? '' : 's'}, not ${given.length}.`, name);
  }
  return { is: 'call', name, args: given.map((arg) => build(arg, walk)) };
}

const raises = (tree: Tree): boolean => tree.is === 'binary' && tree.sign === '^' ? true : tree.is === 'unary' ? raises(tree.of) : tree.is === 'binary' ? raises(tree.left) || raises(tree.right) : false;

/** One side of a comparison for equality, where text is allowed. */
const side = (node: MathNode, walk: Walk): Tree =>
  node.type === 'ConstantNode' && typeof node.value === 'string' ? { is: 'text', value: node.value } : build(node, walk);

function operator(node: MathNode, walk: Walk): Tree {
  const [first, second] = node.args ?? [];
  const fn = typeof node.fn === 'string' ? node.fn : '';
  if (node.implicit && first && second) return stop(`Write * between ${first.toString()} and ${second.toString()}.`, second.toString());
  if (first && !second) {
    if (fn === 'unaryMinus') return { is: 'unary', sign: '-', of: build(first, walk) };
    if (fn === 'unaryPlus') return { is: 'unary', sign: '+', of: build(first, walk) };
    if (fn === 'not') return { is: 'unary', sign: 'not', of: build(first, walk) };
  }
  const sign = Object.hasOwn(BINARY, fn) ? BINARY[fn] : undefined;
  if (!first || !second || !sign || node.args?.length !== 2) return stop(`The sign ${node.op ?? ''} has no meaning here.`, node.op);
  const equality = sign === '==' || sign === '!=';
  const [left, right] = equality ? [side(first, walk), side(second, walk)] : [build(first, walk), build(second, walk)];
  if (sign === '^' && raises(right)) return stop('A power in the exponent of a power is not allowed.', '^');
  return { is: 'binary', sign, left, right };
}

/** a < b < c: each neighbouring pair holds. */
function chain(node: MathNode, walk: Walk): Tree {
  const params = children(node);
  const pairs = (node.conditionals ?? []).map((fn, i): Tree => {
    const sign = Object.hasOwn(BINARY, fn) ? BINARY[fn] : undefined;
    const [left, right] = [params[i], params[i + 1]];
    return sign && left && right ? { is: 'binary', sign, left: build(left, walk), right: build(right, walk) } : stop('This comparison is not allowed.');
  });
  return pairs.reduce((left, right) => ({ is: 'binary', sign: 'and', left, right }));
}

function build(node: MathNode, walk: Walk): Tree {
  walk.nodes += 1;
  if (walk.nodes > MOST_NODES) stop(`An expression has at most ${MOST_NODES} terms; derive some of them under names of their own.`);
  switch (node.type) {
    case 'ConstantNode': return constant(node.value);
    case 'SymbolNode': return symbol(node.name ?? '', walk);
    case 'ParenthesisNode': return build(children(node)[0] ?? stop('These brackets are empty.', '('), walk);
    case 'OperatorNode': return operator(node, walk);
    case 'RelationalNode': return chain(node, walk);
    case 'FunctionNode': return call(node, walk);
    case 'AccessorNode': return accessor(node, walk);
    case 'ArrayNode': return stop('A list in square brackets stands only in min and max.', '[');
    case 'ConditionalNode': {
      const [test, yes, no] = children(node);
      return test && yes && no ? { is: 'choose', test: build(test, walk), yes: build(yes, walk), no: build(no, walk) } : stop('Write test ? value : other value.', '?');
    }
    default: return stop(FORBIDDEN[node.type] ?? 'This is not allowed in an expression.');
  }
}

/** Brackets and signs in a row nest the parser itself: bounded before it runs. */
function tooDeep(source: string): boolean {
  let depth = 0;
  let run = 0;
  for (const sign of source) {
    depth += '([{'.includes(sign) ? 1 : ')]}'.includes(sign) ? -1 : 0;
    run = '+-~!'.includes(sign) ? run + 1 : sign === ' ' ? run : 0;
    if (depth > DEEPEST || run > DEEPEST) return true;
  }
  return (source.match(/\bnot\b|\?|\^/g) ?? []).length > DEEPEST;
}

/** Where a word stands by itself in the source; 0 where it does not. */
function placeOf(source: string, word: string): number {
  if (word === '') return 0;
  for (let at = source.indexOf(word); at >= 0; at = source.indexOf(word, at + 1)) {
    const letter = /[A-Za-z0-9_.]/;
    const apart = !/^[A-Za-z]/.test(word) || (!letter.test(source[at - 1] ?? '') && !/[A-Za-z0-9_]/.test(source[at + word.length] ?? ''));
    if (apart) return at;
  }
  return 0;
}

const refuseAt = (code: 'name' | 'schema', says: string, at: number): ExpressionRefusal => ({ ...refuse(code, says), at });

/** Reads an expression and lets through only what the language names. Never throws on a text. */
export function parseExpression(source: string, names: Names): ExpressionResult<Tree> {
  if (source.trim() === '') return refuseAt('name', 'An expression is missing here.', 0);
  if (source.length > LONGEST_EXPRESSION) return refuseAt('name', `An expression has at most ${LONGEST_EXPRESSION} characters.`, LONGEST_EXPRESSION);
  if (tooDeep(source)) return refuseAt('name', 'This expression is nested too deeply; derive some of it under names of their own.', 0);
  const parsed = parseMath(source);
  if (!parsed.ok) return refuseAt('name', `This does not read as an expression: ${parsed.says}`, parsed.at);
  try {
    return { ok: true, value: build(parsed.node, { names, nodes: 0 }) };
  } catch (error) {
    if (error instanceof Stop) return refuseAt(error.code, error.says, placeOf(source, error.word));
    throw error;
  }
}
