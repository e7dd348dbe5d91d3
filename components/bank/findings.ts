import type { StoredReport, UnreadReport } from '@/lib/bank/sandbox-tasks';
import type { Problem, ProblemCode } from '@/lib/templates/problem';

/** What a code of a problem means, as a heading. */
export const codeTitles: Record<ProblemCode, string> = {
  schema: 'Not the form of a template',
  name: 'A formula that cannot be read',
  dimension: 'Units that do not fit',
  'not-finite': 'No value in some draws',
  absurd: 'Outside the limits stated',
  'requirement-never': 'No draw holds the requirements',
  redraws: 'Too many redraws',
  'few-distinct': 'Too few different questions',
  copied: 'Too often the same numbers',
  'misstep-accepted': 'A wrong way counts as right',
  window: 'Honest rounding falls outside',
  'options-close': 'Options too close together',
  'right-count': 'Not exactly one right option',
  'sign-change': 'A key of both signs',
  example: 'A published figure is not reproduced',
  placeholder: 'A placeholder without a value',
  length: 'Too long for the paper',
  'caution-missing': 'A caution is missing',
};

export const isWhole = (report: unknown): report is StoredReport => typeof report === 'object' && report !== null && 'draws' in report && 'bins' in report;
export const isUnread = (report: unknown): report is UnreadReport => typeof report === 'object' && report !== null && 'problems' in report && !('bins' in report);

export const problemsIn = (report: unknown): Problem[] => (isWhole(report) || isUnread(report) ? report.problems : []);

export const percentOf = (share: number): string => `${(share * 100).toFixed(1)} %`;

/** "in 40 of 2,000 draws (2.0 %)"; empty for a problem of the text itself. */
export const extentOf = (problem: Problem, draws: number): string =>
  problem.seeds.length === 0 ? '' : `in ${problem.count.toLocaleString('en')} of ${draws.toLocaleString('en')} draws (${percentOf(problem.share)})`;

/** Problems by code, in the order they were found. */
export function byCode(problems: readonly Problem[]): [ProblemCode, Problem[]][] {
  const groups = new Map<ProblemCode, Problem[]>();
  for (const problem of problems) groups.set(problem.code, [...(groups.get(problem.code) ?? []), problem]);
  return [...groups];
}
