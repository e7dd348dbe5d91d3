import { ExpressionError } from '@/lib/expressions/compile';
import { deriveRounded, drawValues, type DrawnValues, mostRedraws } from './values';
import { completeDraw, defaultLocale } from './draw';
import { binsOf, type Bin, quantilesOf, type Quantiles } from './distribution';
import { problemsOfSpread, Spread } from './spread';
import { checkExamples } from './examples';
import type { Examiner, Rounded, Scope, Sight } from './kinds/kind';
import { Tally } from './kinds/tally';
import { Leaks } from './leaks';
import type { Template } from './plan';
import type { Problem, ProblemCode } from './problem';

/** What a check found, in the form of the page. `bins` holds a histogram of each part's key for the screen. */
export interface CheckReport {
  template: string;
  ok: boolean;
  draws: number;
  distinct: number;
  redraws: { mean: number; max: number };
  parts: Record<string, Quantiles>;
  bins: Record<string, Bin[]>;
  problems: Problem[];
  /** problems that the template's own reasons answer */
  excused: Problem[];
}
export interface CheckProgress { done: number; draws: number; problems: number }

export const defaultDraws = 2000;
const stepSize = 50;
/** Draws without a paper after which a check need not go on: each costs 500 redraws. */
const enoughInVain = 10;

/** Counts each kind of problem over the draws, by code, part and text. */
class Ledger {
  private readonly rows = new Map<string, { code: ProblemCode; part?: string; says: string; tally: Tally }>();
  note(code: ProblemCode, says: string, seed: string, part?: string): void {
    const id = JSON.stringify([code, part, says]);
    const row = this.rows.get(id) ?? { code, part, says, tally: new Tally() };
    this.rows.set(id, row);
    row.tally.add(seed);
  }
  get size(): number {
    return this.rows.size;
  }
  problems(draws: number): Problem[] {
    return [...this.rows.values()].map(({ code, part, says, tally }) => ({
      code, ...(part === undefined ? {} : { part }), count: tally.count, share: tally.count / draws, seeds: tally.seeds, says,
    }));
  }
}

/** The scope that an honest candidate works in who rounds every step to so many figures; made when first asked for. */
const roundedScopes = (template: Template, { scope }: DrawnValues): Rounded => {
  const made = new Map<number, Scope>();
  return (figures) => {
    const known = made.get(figures);
    if (known !== undefined) return known;
    const rounded: Scope = { values: {}, parts: {} };
    for (const { name } of template.plan.givens) rounded.values[name] = scope.values[name] ?? NaN;
    deriveRounded(template.plan, rounded, figures, scope.values);
    for (const part of template.plan.parts) {
      const value = part.roundedValue(rounded, figures);
      if (value !== undefined) rounded.parts[part.part] = value;
    }
    made.set(figures, rounded);
    return rounded;
  };
};

class Check {
  readonly ledger = new Ledger();
  readonly spread: Spread;
  private readonly leaks: Leaks;
  readonly examiners: Examiner[];
  readonly redraws: number[] = [];
  private readonly inVain = new Tally();
  readonly failures: number[];
  done = 0;

  constructor(private readonly template: Template) {
    const { plan } = template;
    this.examiners = plan.parts.map((part) => part.examiner());
    this.spread = new Spread(plan.parts.map(({ part }) => part));
    this.leaks = new Leaks(template);
    this.failures = plan.requirements.map(() => 0);
  }

  look(seed: string): void {
    this.done += 1;
    try {
      const values = drawValues(this.template, seed, this.failures);
      if (values.ok) this.redraws.push(values.value.redraws);
      if (values.ok) this.lookAt(seed, values.value);
      else this.inVain.add(seed);
    } catch (error) {
      if (!(error instanceof ExpressionError)) throw error;
      this.ledger.note('not-finite', `A formula has no value: ${error.message}`, seed);
    }
  }

  get isHopeless(): boolean {
    return this.inVain.count >= enoughInVain;
  }
  private get worstRequirement(): string {
    return this.template.plan.requirements[this.failures.indexOf(Math.max(...this.failures))]?.source ?? '';
  }

  private lookAt(seed: string, values: DrawnValues): void {
    const draw = completeDraw(this.template, seed, defaultLocale, values);
    for (const { name } of this.template.plan.derived) {
      const value = values.scope.values[name];
      if (typeof value === 'number' && !Number.isFinite(value)) this.ledger.note('not-finite', `The derived value ${name} is infinite or not a number.`, seed);
    }
    const rounded = roundedScopes(this.template, values);
    this.examiners.forEach((examiner, index) => {
      const drawn = draw.parts[index];
      if (drawn === undefined) return;
      const sight: Sight = { seed, scope: values.scope, drawn };
      examiner.look(sight, rounded, (code, says) => this.ledger.note(code, says, seed, drawn.part));
    });
    this.spread.add(seed, draw.parts);
    this.leaks.look(draw);
  }

  problems(): Problem[] {
    const { template } = this;
    const parts = template.plan.parts.flatMap(({ part }, index) => (this.examiners[index]?.finish() ?? []).map((found) => ({ ...found, part })));
    return [...this.ledger.problems(this.done), ...parts, ...this.leaks.finish(), ...this.redrawProblems(), ...problemsOfSpread(this.spread, this.done), ...checkExamples(template)];
  }

  private redrawProblems(): Problem[] {
    const { count, seeds } = this.inVain;
    if (count > 0) {
      const says = `No draw held all requirements in ${mostRedraws} redraws; "${this.worstRequirement}" failed most: loosen it or change the givens.`;
      return [{ code: 'requirement-never', count, share: count / this.done, seeds, says }];
    }
    const thrown = this.redraws.reduce((sum, one) => sum + one, 0);
    const drawn = this.done + thrown;
    if (thrown <= this.done) return [];
    return [{
      code: 'redraws', count: thrown, share: thrown / drawn, seeds: [],
      says: `Only ${this.done} of ${drawn} draws held the requirements; "${this.worstRequirement}" failed most: narrow the givens so that at least half do.`,
    }];
  }

  report(): CheckReport {
    const { template } = this;
    const { reasons } = template.head;
    const excusedBy = (problem: Problem) => Object.hasOwn(reasons, problem.code);
    const all = this.problems();
    const problems = all.filter((problem) => !excusedBy(problem));
    const mean = this.redraws.length === 0 ? 0 : this.redraws.reduce((sum, count) => sum + count, 0) / this.redraws.length;
    return {
      template: template.head.template, ok: problems.length === 0, draws: this.done, distinct: this.spread.distinct,
      redraws: { mean: Math.round(mean * 1000) / 1000, max: this.redraws.reduce((most, count) => Math.max(most, count), 0) },
      parts: Object.fromEntries(this.spread.values.map(([part, values]) => [part, quantilesOf(values)])),
      bins: Object.fromEntries(this.spread.values.map(([part, values]) => [part, binsOf(values)])),
      problems, excused: all.filter(excusedBy),
    };
  }
}

export interface CheckOptions { draws?: number; onProgress?: (progress: CheckProgress) => void; signal?: AbortSignal }

/**
 * Checks a template over many draws, in steps: yields after each 50 draws so that a job can show progress, let others
 * work, or stop. It ends early where draw after draw never holds the requirements. The seeds are check-0, check-1, …
 */
export function* checkInSteps(template: Template, draws: number = defaultDraws): Generator<CheckProgress, CheckReport> {
  const check = new Check(template);
  for (let index = 0; index < draws; index += 1) {
    check.look(`check-${index}`);
    if (check.isHopeless) break;
    if (check.done % stepSize === 0 || check.done === draws) yield { done: check.done, draws, problems: check.ledger.size };
  }
  return check.report();
}

/** Runs the whole check at once; throws the signal's reason where it is aborted. */
export function checkTemplate(template: Template, { draws = defaultDraws, onProgress, signal }: CheckOptions = {}): CheckReport {
  const steps = checkInSteps(template, draws);
  for (;;) {
    signal?.throwIfAborted();
    const step = steps.next();
    if (step.done) return step.value;
    onProgress?.(step.value);
  }
}
