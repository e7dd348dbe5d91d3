import type { z } from 'zod';
import { type Problem, type ProblemCode, textProblem } from './problem';
import type { Path, ReadYaml } from './yaml';

/** Gathers the problems of one text, each with its place. */
export class Complaints {
  readonly problems: Problem[] = [];
  constructor(private readonly yaml: ReadYaml, private readonly partAt: (index: number) => string | undefined) {}

  add(code: ProblemCode, says: string, path: Path, column = 0): void {
    const place = this.yaml.place(path);
    const part = path[0] === 'parts' && typeof path[1] === 'number' ? this.partAt(path[1]) : undefined;
    this.problems.push(textProblem(code, says, {
      ...(part === undefined ? {} : { part }),
      ...(place === undefined ? {} : { line: place.line, column: place.column + column }),
    }));
  }

  /** Complaints of a schema in words: where, and what would be right there. */
  addIssues(issues: readonly z.core.$ZodIssue[]): void {
    for (const issue of issues) {
      const path = issue.path.filter((step): step is string | number => typeof step !== 'symbol');
      if (issue.code === 'unrecognized_keys')
        for (const key of issue.keys) this.add('schema', `${nameOf(path)}"${key}" is not a word of the template language here.`, [...path, key]);
      else this.add('schema', `${nameOf(path)}${issueText(issue)}.`, path);
    }
  }
}

const nameOf = (path: Path): string => (path.length === 0 ? '' : `${path.map((step) => (typeof step === 'number' ? String(step + 1) : step)).join(' › ')}: `);

const issueText = (issue: z.core.$ZodIssue): string => {
  if (issue.code === 'invalid_type') return issue.input === undefined ? 'is missing' : `must be ${article(issue.expected)}`;
  if (issue.code === 'too_big') return `is too long or too large: at most ${issue.maximum}`;
  if (issue.code === 'too_small') return issue.minimum === 1 ? 'must not be empty' : `is too short or too small: at least ${issue.minimum}`;
  if (issue.code === 'invalid_value' && issue.values.length > 1) return `must be one of ${issue.values.map(String).join(', ')}`;
  if (issue.code === 'invalid_union') return unionText(issue);
  if (issue.code === 'invalid_key') return issue.issues.map(issueText).join('; ');
  return issue.message.replace(/\.$/, '');
};

/** Of the forms a union allows, the one that went furthest tells best what is wrong. */
const unionText = (issue: z.core.$ZodIssueInvalidUnion): string => {
  const deepest = [...issue.errors].sort((a, b) => depth(b) - depth(a))[0]?.[0];
  if (deepest === undefined) return 'has none of the forms allowed here';
  const path = deepest.path.filter((step): step is string | number => typeof step !== 'symbol');
  if (deepest.code === 'unrecognized_keys') return `"${deepest.keys.join(', ')}" is not a word of the template language here`;
  return `${nameOf(path)}${issueText(deepest)}`;
};
const depth = (issues: readonly z.core.$ZodIssue[]): number =>
  Math.max(0, ...issues.map((issue) => issue.path.length + (issue.code === 'invalid_type' && issue.path.length === 0 ? -1 : 0)));

const article = (type: string): string => ({ string: 'text', number: 'a number', int: 'a whole number', boolean: 'true or false', array: 'a list', object: 'a set of "name: value" lines', record: 'a set of "name: value" lines' })[type] ?? type;
