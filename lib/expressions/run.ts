import { ExpressionError, below, complexFunction, complexly, equals, truth } from './arithmetic';
import type { Run, Scope, Value } from './arithmetic';
import { REAL_FUNCTIONS } from './functions';
import type { BinarySign, Tree } from './tree';

// A tree becomes nested functions once. Real numbers take the short way through each; anything else goes the long one.

const nameRun = (name: string): Run => (scope) => {
  const value = scope.values[name];
  if (value === undefined) throw new ExpressionError(`${name} has no value.`);
  return value;
};

const partRun = (part: string): Run => (scope) => {
  const value = scope.parts[part];
  if (value === undefined) throw new ExpressionError(`Part ${part} has no value.`);
  return value;
};

type Signed = (left: Run, right: Run) => Run;

const ARITHMETIC: Readonly<Record<'+' | '-' | '*' | '/' | '^', Signed>> = {
  '+': (left, right) => (scope) => {
    const a = left(scope);
    const b = right(scope);
    return typeof a === 'number' && typeof b === 'number' ? a + b : complexly('+', a, b);
  },
  '-': (left, right) => (scope) => {
    const a = left(scope);
    const b = right(scope);
    return typeof a === 'number' && typeof b === 'number' ? a - b : complexly('-', a, b);
  },
  '*': (left, right) => (scope) => {
    const a = left(scope);
    const b = right(scope);
    return typeof a === 'number' && typeof b === 'number' ? a * b : complexly('*', a, b);
  },
  '/': (left, right) => (scope) => {
    const a = left(scope);
    const b = right(scope);
    return typeof a === 'number' && typeof b === 'number' ? a / b : complexly('/', a, b);
  },
  '^': (left, right) => (scope) => {
    const a = left(scope);
    const b = right(scope);
    return typeof a === 'number' && typeof b === 'number' ? a ** b : complexly('^', a, b);
  },
};

const LOGIC: Readonly<Record<Exclude<BinarySign, '+' | '-' | '*' | '/' | '^'>, Signed>> = {
  and: (left, right) => (scope) => truth(left(scope)) && truth(right(scope)),
  or: (left, right) => (scope) => truth(left(scope)) || truth(right(scope)),
  '==': (left, right) => (scope) => equals(left(scope), right(scope)),
  '!=': (left, right) => (scope) => !equals(left(scope), right(scope)),
  '<': (left, right) => (scope) => below(left(scope), right(scope)),
  '>': (left, right) => (scope) => below(right(scope), left(scope)),
  '<=': (left, right) => (scope) => atMost(left(scope), right(scope)),
  '>=': (left, right) => (scope) => atMost(right(scope), left(scope)),
};

const atMost = (a: Value, b: Value) => below(a, b) || equals(a, b);

const isArithmetic = (sign: BinarySign): sign is '+' | '-' | '*' | '/' | '^' => sign in ARITHMETIC;

function negative(of: Run): Run {
  return (scope) => {
    const value = of(scope);
    return typeof value === 'number' ? -value : complexly('-', 0, value);
  };
}

function callRun(name: string, args: Run[]): Run {
  if (name === 'between') return betweenRun(args);
  if (name === 'polar' || name === 'polard') return polarRun(args, name === 'polard');
  const known = REAL_FUNCTIONS[name];
  if (!known) throw new Error(`No function ${name}`);
  const { real } = known;
  const [first] = args;
  if (args.length === 1 && first) {
    return (scope) => {
      const value = first(scope);
      return typeof value === 'number' ? real(value) : complexFunction(name, [value]);
    };
  }
  return (scope) => {
    const values = args.map((arg) => arg(scope));
    const numbers = values.filter((value): value is number => typeof value === 'number');
    return numbers.length === values.length ? real(...numbers) : complexFunction(name, values);
  };
}

const realOf = (run: Run | undefined, scope: Scope, name: string): number => {
  const value = run?.(scope);
  if (typeof value !== 'number') throw new ExpressionError(`${name} needs real numbers.`);
  return value;
};

const betweenRun = ([x, low, high]: Run[]): Run => (scope) => {
  const value = realOf(x, scope, 'between');
  return atMost(realOf(low, scope, 'between'), value) && atMost(value, realOf(high, scope, 'between'));
};

const polarRun = ([size, angle]: Run[], degrees: boolean): Run => (scope) => {
  const [length, turn] = [realOf(size, scope, 'polar'), realOf(angle, scope, 'polar')];
  const [cos, sin] = degrees ? [REAL_FUNCTIONS.cosd, REAL_FUNCTIONS.sind] : [REAL_FUNCTIONS.cos, REAL_FUNCTIONS.sin];
  return { re: length * (cos?.real(turn) ?? NaN), im: length * (sin?.real(turn) ?? NaN) };
};

/** A tree as a function of its scope. */
export function runOf(tree: Tree): Run {
  switch (tree.is) {
    case 'number': case 'truth': case 'text': return () => tree.value;
    case 'constant': return constantRun(tree.name);
    case 'name': return nameRun(tree.name);
    case 'part': return partRun(tree.part);
    case 'unary': return unaryRun(tree.sign, runOf(tree.of));
    case 'binary': return isArithmetic(tree.sign) ? ARITHMETIC[tree.sign](runOf(tree.left), runOf(tree.right)) : LOGIC[tree.sign](runOf(tree.left), runOf(tree.right));
    case 'choose': {
      const [test, yes, no] = [runOf(tree.test), runOf(tree.yes), runOf(tree.no)];
      return (scope) => (truth(test(scope)) ? yes(scope) : no(scope));
    }
    case 'call': return callRun(tree.name, tree.args.map(runOf));
  }
}

function constantRun(name: 'pi' | 'e' | 'i'): Run {
  const value: Value = name === 'pi' ? Math.PI : name === 'e' ? Math.E : { re: 0, im: 1 };
  return () => value;
}

const unaryRun = (sign: '-' | '+' | 'not', of: Run): Run => {
  if (sign === 'not') return (scope) => !truth(of(scope));
  return sign === '-' ? negative(of) : of;
};
