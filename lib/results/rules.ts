import { done, refuse, type Result } from '@/lib/result';
import type { ResultState } from './model';

export type ResultEvent = 'mark' | 'override' | 'moderate' | 'release' | 'seal' | 'withhold' | 'lift';
export type ResultFacts = { state: ResultState; withheld: boolean };

const moves: Record<ResultEvent, Partial<Record<ResultState, ResultState>>> = {
  // Marking again after moderation undoes the moderation: somebody looks once more.
  mark: { provisional: 'provisional', moderated: 'provisional' },
  override: { provisional: 'provisional', moderated: 'moderated', released: 'released' },
  moderate: { provisional: 'moderated' },
  release: { moderated: 'released' },
  seal: { released: 'sealed' },
  withhold: { provisional: 'provisional', moderated: 'moderated' },
  lift: { provisional: 'provisional', moderated: 'moderated' },
};

const words: Record<ResultEvent, string> = {
  mark: 'Marking changes a result only until it is released',
  override: 'A mark can be changed until the result is sealed',
  moderate: 'Only a provisional result can be moderated',
  release: 'Only a moderated result can be released',
  seal: 'Only a released result can be sealed',
  withhold: 'A result can be withheld only before it is released',
  lift: 'Only a result that is not released can be withheld',
};

/** The next state of a result after `event`, or a coded refusal. Withholding stands beside a state and stops release and sealing. */
export function nextResult(facts: ResultFacts, event: ResultEvent): Result<ResultFacts, 'wrong-state' | 'withheld' | 'not-withheld'> {
  const state = moves[event][facts.state];
  if (!state) return refuse('wrong-state', `${words[event]}; this one is ${facts.state}.`);
  if ((event === 'release' || event === 'seal' || event === 'withhold') && facts.withheld) return refuse('withheld', 'This result is withheld.');
  if (event === 'lift' && !facts.withheld) return refuse('not-withheld', 'This result is not withheld.');
  return done({ state, withheld: event === 'withhold' || (event !== 'lift' && facts.withheld) });
}

/** Whether a student may see the own result, with keys and solution. */
export const isOpenToStudent = ({ state, withheld }: ResultFacts): boolean => !withheld && (state === 'released' || state === 'sealed' || state === 'amended');

/** One condition on the way to a release or to sealing; `open` where it is not met yet. */
export type Condition = { code: string; open: boolean; says: string };

/** What is known of a sitting's results when they are to be moved on. */
export type SittingFacts = {
  closed: boolean;
  reconciled: boolean;
  candidates: number;
  /** Candidates whose ended paper has no result yet. */
  unmarked: number;
  /** Parts that wait for a marker. */
  forMarker: number;
  /** Answers after the end that nobody decided on. */
  claims: number;
  states: Readonly<Record<ResultState, number>>;
  withheld: number;
};

const count = (number: number, one: string, many: string): string => (number === 1 ? `1 ${one}` : `${number} ${many}`);

const marking = (facts: SittingFacts): Condition[] => [
  { code: 'sitting-open', open: !facts.closed, says: facts.closed ? 'The sitting is closed' : 'The sitting is not closed yet' },
  { code: 'unmarked', open: facts.unmarked > 0, says: facts.unmarked > 0 ? `${count(facts.unmarked, 'paper is', 'papers are')} not marked yet` : 'Every paper is marked' },
  {
    code: 'for-marker', open: facts.forMarker > 0,
    says: facts.forMarker > 0 ? `${count(facts.forMarker, 'part waits', 'parts wait')} for a marker` : 'No part waits for a marker',
  },
  {
    code: 'claims', open: facts.claims > 0,
    says: facts.claims > 0 ? `${count(facts.claims, 'answer that came', 'answers that came')} after the end ${facts.claims === 1 ? 'is' : 'are'} not decided` : 'No answer after the end is open',
  },
];

/** What stands in the way of releasing a sitting's results. A result that is withheld stays behind and stops no other. */
export function releaseConditions(facts: SittingFacts): Condition[] {
  const { provisional } = facts.states;
  return [
    ...marking(facts),
    { code: 'moderation', open: provisional > 0, says: provisional > 0 ? `${count(provisional, 'result is', 'results are')} not moderated yet` : 'Every result is moderated' },
  ];
}

/** What stands in the way of sealing a sitting's results. */
export function sealConditions(facts: SittingFacts): Condition[] {
  const waiting = facts.states.provisional + facts.states.moderated;
  return [
    { code: 'not-reconciled', open: !facts.reconciled, says: facts.reconciled ? 'Register and papers are reconciled' : 'Register and papers are not reconciled yet' },
    ...marking(facts).slice(1),
    { code: 'not-released', open: waiting > 0, says: waiting > 0 ? `${count(waiting, 'result is', 'results are')} not released yet` : 'Every result is released' },
    { code: 'withheld', open: facts.withheld > 0, says: facts.withheld > 0 ? `${count(facts.withheld, 'result is', 'results are')} withheld` : 'No result is withheld' },
  ];
}
