import bundle from 'mathjs/lib/browser/math.js';
import type { Complex, MathJsInstance } from 'mathjs';

/** What we look at of a parsed node; its evaluation is never called. */
export type MathNode = {
  type: string;
  name?: string;
  value?: unknown;
  op?: string;
  fn?: string | MathNode;
  implicit?: boolean;
  dotNotation?: boolean;
  conditionals?: string[];
  args?: MathNode[];
  forEach(visit: (child: MathNode) => void): void;
  toString(): string;
};

// The package's single file: a server takes ten times as long to load its thousand modules.
const math: MathJsInstance = bundle.create({ predictable: true });

const parseText = math.parse.bind(math);

/** The arithmetic of complex numbers, taken before anything is closed. */
const { add, subtract, multiply, divide, pow, sqrt, exp, log, abs, arg, conj, complex } = math;
export const complexMath = { add, subtract, multiply, divide, pow, sqrt, exp, log, abs, arg, conj, complex };
export type { Complex };

// Only the parser and the functions above are ever called; a way to anything else is a mistake and throws.
const closed = () => {
  throw new Error('This function is closed.');
};
math.import(
  Object.fromEntries(['import', 'createUnit', 'evaluate', 'parse', 'compile', 'simplify', 'derivative', 'resolve', 'reviver'].map((name) => [name, closed])),
  { override: true },
);

/** Parses without judging. `says` in mathjs' words; `at` from 0. */
export function parse(source: string): { ok: true; node: MathNode } | { ok: false; says: string; at: number } {
  try {
    return { ok: true, node: parseText(source) as unknown as MathNode };
  } catch (error) {
    const { message, char } = error as { message?: unknown; char?: unknown };
    const at = typeof char === 'number' ? Math.min(Math.max(0, char - 1), source.length) : 0;
    return { ok: false, says: `${String(message).replace(/\s*\(char \d+\)$/, '')}.`, at };
  }
}
