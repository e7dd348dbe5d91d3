/** Codes of the problems that reading or checking a template may find. */
export const problemCodes = [
  'schema', 'name', 'dimension', 'not-finite', 'absurd', 'requirement-never', 'redraws', 'few-distinct', 'copied', 'misstep-accepted',
  'window', 'options-close', 'right-count', 'sign-change', 'example', 'placeholder', 'length', 'caution-missing',
] as const;
export type ProblemCode = (typeof problemCodes)[number];

/** Problems that an author may answer with a reason instead of a change. */
export const excusable = ['few-distinct', 'redraws', 'copied', 'window'] as const;

/**
 * One thing wrong with a template. `line` and `column` (from 1) point into its text where the fault has a place there;
 * `count` and `share` (0 to 1) say in how many of the draws it showed, `seeds` name up to five of them.
 */
export interface Problem {
  code: ProblemCode;
  part?: string;
  line?: number;
  column?: number;
  count: number;
  share: number;
  seeds: string[];
  says: string;
}

/** A problem of the text itself: it is there in every draw. */
export const textProblem = (code: ProblemCode, says: string, place: { part?: string; line?: number; column?: number } = {}): Problem => ({
  code, ...place, count: 1, share: 1, seeds: [], says,
});
