import { type Document, isAlias, isMap, isScalar, LineCounter, type Node, parseDocument, visit } from 'yaml';
import { type Problem, textProblem } from './problem';

/** Longest text of a template [bytes of UTF-8]. */
export const longestTemplate = 64 * 1024;
const deepest = 12;

export type Path = readonly (string | number)[];
export interface Place { line: number; column: number }

/** A YAML document as plain data, with a way back from a path in the data to its place in the text. */
export interface ReadYaml {
  value: unknown;
  place(path: Path): Place | undefined;
}

const placeIn = (document: Document, lines: LineCounter, path: Path): Place | undefined => {
  for (let length = path.length; length >= 0; length -= 1) {
    const node = length === 0 ? document.contents : document.getIn(path.slice(0, length), true);
    const start = (node as Node | null | undefined)?.range?.[0];
    if (start !== undefined) {
      const { line, col } = lines.linePos(start);
      return { line, column: col };
    }
  }
  return undefined;
};

const forbidden = (document: Document, lines: LineCounter): Problem[] => {
  const problems: Problem[] = [];
  const refuse = (node: Node, says: string) => {
    const start = node.range?.[0];
    const place = start === undefined ? undefined : lines.linePos(start);
    problems.push(textProblem('schema', says, place ? { line: place.line, column: place.col } : {}));
  };
  visit(document, {
    Node(_, node, path) {
      if (isAlias(node)) refuse(node, 'Aliases (*name) are not allowed here: write the value out.');
      else if (node.anchor) refuse(node, 'Anchors (&name) are not allowed here: leave the anchor out.');
      else if (node.tag) refuse(node, 'Tags (!name) are not allowed here: leave the tag out.');
      if (path.length > deepest * 2) refuse(node, 'The text is nested too deeply.');
    },
    Pair(_, pair) {
      const key = isScalar(pair.key) ? pair.key : null;
      if (key && ['__proto__', 'constructor', 'prototype', '<<'].includes(String(key.value)))
        refuse(key, `"${String(key.value)}" cannot be used as a name.`);
    },
  });
  return problems;
};

/**
 * Reads one strict YAML 1.2 document of at most 64 kB without aliases, anchors or tags; a warning is an error.
 * Every problem names its line and column.
 */
export function readYaml(text: string): { ok: true; yaml: ReadYaml } | { ok: false; problems: Problem[] } {
  if (new TextEncoder().encode(text).length > longestTemplate)
    return { ok: false, problems: [textProblem('schema', 'The text is longer than 64 kB: shorten it.')] };
  if (/^%/m.test(text))
    return { ok: false, problems: [textProblem('schema', 'Directives (%…) are not allowed here.')] };
  const lines = new LineCounter();
  const document = parseDocument(text, {
    version: '1.2', schema: 'core', strict: true, uniqueKeys: true, stringKeys: true, prettyErrors: false, lineCounter: lines, resolveKnownTags: false,
    logLevel: 'silent',
  });
  const faults = [...document.errors, ...document.warnings].map((fault) => {
    const { line, col } = lines.linePos(fault.pos[0]);
    return textProblem('schema', `${fault.message.trim().replace(/\.?$/, '.')}`, { line, column: col });
  });
  faults.push(...forbidden(document, lines));
  if (faults.length > 0) return { ok: false, problems: faults };
  if (!isMap(document.contents)) return { ok: false, problems: [textProblem('schema', 'A template is a list of "name: value" lines.', { line: 1, column: 1 })] };
  return { ok: true, yaml: { value: document.toJS({ maxAliasCount: 0 }), place: (path) => placeIn(document, lines, path) } };
}
