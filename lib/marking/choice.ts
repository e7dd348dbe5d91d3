import type { DrawnOption, Marked, Marking, PartMarking } from '@/lib/templates/kinds/kind';
import type { ChoicePlan } from '@/lib/templates/kinds/options';

/** Which of the candidate's own earlier values make the taken option the right one; null where none do. */
const carriedFrom = (plan: ChoicePlan, { drawn, own, slipped }: Marking, taken: DrawnOption): string[] | null => {
  const followed = own.some((scope) => {
    const right = plan.rightFor(scope, drawn);
    return right.length === 1 && right[0] === taken.source;
  });
  return followed ? plan.uses.filter((part) => slipped.has(part)) : null;
};

/** Marks an option taken: right, right for the candidate's own earlier values, a known misstep, or wrong. */
export function markChoice(plan: ChoicePlan, marking: Marking): Marked {
  const { drawn, answer, policy } = marking;
  const base = { part: drawn.part, of: drawn.marks, key: drawn.key };
  const outcome = (rest: Omit<PartMarking, 'part' | 'of' | 'key'>): Marked => ({ marking: { ...base, ...rest }, carries: [] });
  const letter = answer.trim().toUpperCase();
  if (letter === '') return outcome({ awarded: 0, verdict: 'blank', rule: 'blank', says: 'No option was taken.' });
  const taken = (drawn.options ?? []).find(({ option }) => option === letter);
  if (taken === undefined) return outcome({ awarded: 0, verdict: 'unread', rule: 'unread', says: `There is no option ${letter.slice(0, 20)}.` });
  const reads = { value: taken.option, unit: '', text: taken.text };
  const carries = taken.value === undefined ? [] : [taken.value];
  const taking = (rest: Omit<PartMarking, 'part' | 'of' | 'key' | 'reads'>): Marked => ({ marking: { ...base, ...rest, reads }, carries });
  if (taken.right) return taking({ awarded: drawn.marks, verdict: 'correct', rule: 'key', says: 'Right.' });
  const from = carriedFrom(plan, marking, taken);
  if (from !== null && from.length > 0 && !from.some((part) => marking.absurd.has(part)))
    return taking({ awarded: drawn.marks * policy.carriedShare, verdict: 'carried', rule: 'follow-through', says: `Right for your own answer to part ${from.join(' and ')}.`, carriedFrom: from });
  if (from !== null && from.length > 0)
    return taking({ awarded: 0, verdict: 'for-marker', rule: 'absurd-carried', says: `This follows from an impossible value in part ${from.join(' and ')}; a person decides.`, carriedFrom: from, flagged: true });
  const loss = taken.earns ?? (policy.wrongOptionCosts === 0 ? 0 : -drawn.marks * policy.wrongOptionCosts);
  if (taken.says !== undefined) return taking({ awarded: loss, verdict: 'misstep', rule: 'misstep', says: `What went wrong: ${taken.says}.` });
  return taking({ awarded: loss, verdict: 'wrong', rule: 'no-match', says: `Not right: the key is ${drawn.key.text}.` });
}
