import type { Value } from '@/lib/expressions/compile';
import { notationOf } from '@/lib/numeric/notation';
import type { Draw } from '@/lib/templates/draw';
import { scopeOf } from '@/lib/templates/scope';
import type { Marked, Marking, PartMarking, PartPlan, Scope } from '@/lib/templates/kinds/kind';
import type { Template } from '@/lib/templates/plan';
import { defaultPolicy, type MarkingPolicy } from './policy';

export interface QuestionMarking { awarded: number; of: number; parts: PartMarking[] }

/** Where a part's working stands among the answers. */
export const workingOf = (part: string): string => `${part}.working`;

const typed = (answers: Readonly<Record<string, string>>, name: string): string => (Object.hasOwn(answers, name) ? (answers[name] ?? '') : '');

/** The candidate's way through a question so far. */
interface Progress {
  /** own values as read, and the same with slips of a prefix put right */
  asRead: Record<string, Value>;
  putRight: Record<string, Value>;
  slipped: Set<string>;
  absurd: Set<string>;
  unitCharged: boolean;
}

/** The true scope with the candidate's own earlier values in place; earlier parts left blank keep their true keys. */
const ownScopes = (truth: Scope, plan: PartPlan, { asRead, putRight }: Progress): Scope[] => {
  if (!plan.uses.some((part) => Object.hasOwn(asRead, part))) return [];
  const scopes = [{ values: truth.values, parts: { ...truth.parts, ...asRead } }];
  const differs = plan.uses.some((part) => putRight[part] !== asRead[part]);
  return differs ? [...scopes, { values: truth.values, parts: { ...truth.parts, ...putRight } }] : scopes;
};

const remember = (progress: Progress, part: string, { marking, carries, absurd, chargesUnit }: Marked): void => {
  const [read, meant = read] = carries;
  if (read !== undefined && meant !== undefined) {
    progress.asRead[part] = read;
    progress.putRight[part] = meant;
  }
  if (marking.verdict !== 'correct') progress.slipped.add(part);
  if (absurd === true) progress.absurd.add(part);
  if (chargesUnit === true) progress.unitCharged = true;
};

/**
 * Marks the answers to one question against its stored draw. `answers` holds what was typed or taken by part id, and
 * working under `workingOf(part)`; a part that is not there is blank. The stored keys are the keys: the template's
 * formulas serve only to follow the candidate's own values through. Throws where draw and template do not belong together.
 */
export function markQuestion(
  template: Template, draw: Draw, answers: Readonly<Record<string, string>>, policy: MarkingPolicy = defaultPolicy, locale: string = draw.locale,
): QuestionMarking {
  const scope = scopeOf(draw);
  const notation = notationOf(locale);
  const progress: Progress = { asRead: {}, putRight: {}, slipped: new Set(), absurd: new Set(), unitCharged: false };
  const parts = template.plan.parts.map((plan, index): PartMarking => {
    const drawn = draw.parts[index];
    if (drawn === undefined || drawn.part !== plan.part) throw new Error(`The draw has no part ${plan.part} of ${template.head.template}.`);
    const marking: Marking = {
      drawn, answer: typed(answers, plan.part), working: typed(answers, workingOf(plan.part)), scope, own: ownScopes(scope, plan, progress),
      slipped: progress.slipped, absurd: progress.absurd, unitCharged: progress.unitCharged, policy, notation,
    };
    const marked = plan.mark(marking);
    remember(progress, plan.part, marked);
    return marked.marking;
  });
  const sum = (pick: (part: PartMarking) => number) => Math.round(parts.reduce((total, part) => total + pick(part), 0) * 1e6) / 1e6;
  return { awarded: sum((part) => part.awarded), of: sum((part) => part.of), parts };
}
