import { shift } from '@/lib/numeric/digits';
import { type Read, readNumber } from '@/lib/numeric/reader';
import { evaluateAmount, isAbsurd } from '@/lib/templates/kinds/quantity';
import type { Marked, Marking, PartMarking, Scope } from '@/lib/templates/kinds/kind';
import type { NumberPlan } from '@/lib/templates/kinds/number';
import { allowanceOf, type Amount, isFiniteAmount, magnitude, matches } from '@/lib/templates/tolerance';

/** Powers of ten by which a prefix may be wrong: milli for kilo is a million. */
const prefixPowers = [3, -3, 6, -6, 9, -9];

type Outcome = Pick<PartMarking, 'awarded' | 'verdict' | 'rule' | 'says'> & Partial<Pick<PartMarking, 'carriedFrom' | 'flagged' | 'unitSlip'>>;

/** The key as stored on the paper, and the keys that follow from the candidate's own earlier values. */
interface Keys { truth: Amount; own: Amount[]; absurd: boolean }

const keysOf = ({ quantity }: NumberPlan, marking: Marking): Keys => {
  const truth = typeof marking.drawn.key.value === 'string' ? NaN : marking.drawn.key.value;
  const used = quantity.key.parts;
  const recomputed = marking.own.map((scope) => evaluateAmount(quantity.key, scope)).filter((key): key is Amount => key !== null && isFiniteAmount(key));
  return {
    truth,
    own: used.length === 0 ? [] : recomputed,
    absurd: used.some((part) => marking.absurd.has(part)) || recomputed.some((key) => isAbsurd(key, quantity.limits)),
  };
};

const and = (parts: readonly string[]): string => (parts.length < 2 ? parts.join('') : `${parts.slice(0, -1).join(', ')} and ${parts.at(-1) ?? ''}`);

const fits = (plan: NumberPlan, value: Amount, key: Amount, { policy }: Marking): boolean =>
  matches(value, key, allowanceOf(key, plan.quantity.accept, plan.quantity.asked, policy.tolerances));

/** Right outright, or right for the candidate's own earlier values. */
function matchKeys(plan: NumberPlan, value: Amount, keys: Keys, marking: Marking): Outcome | null {
  const { drawn, slipped, policy } = marking;
  if (fits(plan, value, keys.truth, marking)) return { awarded: drawn.marks, verdict: 'correct', rule: 'key', says: 'Right.' };
  if (!keys.own.some((key) => fits(plan, value, key, marking))) return null;
  const from = plan.uses.filter((part) => slipped.has(part));
  if (keys.absurd)
    return { awarded: 0, verdict: 'for-marker', rule: 'absurd-carried', flagged: true, carriedFrom: from, says: `This follows from an impossible value in part ${and(from)}; a person decides.` };
  if (from.length === 0) return { awarded: drawn.marks, verdict: 'correct', rule: 'own-rounding', says: 'Right, from your own rounded values.' };
  return {
    awarded: drawn.marks * policy.carriedShare, verdict: 'carried', rule: 'follow-through', carriedFrom: from,
    says: `Right for your own answer to part ${and(from)}; the slip there has cost its marks already.`,
  };
}

/** The known wrong way that leads to this value, tried with the true and with the candidate's own earlier values. */
function matchMissteps(plan: NumberPlan, value: Amount, marking: Marking): Outcome | null {
  const { drawn, scope, own } = marking;
  const hits = plan.quantity.missteps.filter((misstep, index) => {
    const stored = drawn.missteps[index]?.value;
    const again = own.map((earlier: Scope) => evaluateAmount(misstep.key, earlier));
    return [stored === undefined ? evaluateAmount(misstep.key, scope) : stored, ...again].some((key) => key !== null && isFiniteAmount(key) && fits(plan, value, key, marking));
  });
  const best = hits.sort((a, b) => b.earns - a.earns)[0];
  return best === undefined ? null : { awarded: Math.min(best.earns, drawn.marks), verdict: 'misstep', rule: 'misstep', says: `What went wrong: ${best.says}.` };
}

const shifted = (value: Amount, power: number): Amount =>
  typeof value === 'number' ? shift(value, power) : { re: shift(value.re, power), im: shift(value.im, power) };

/** A value that is right but for a power of a thousand: the prefix or the unit was written wrong. */
function matchPrefix(plan: NumberPlan, value: Amount, keys: Keys, marking: Marking): { outcome: Outcome; meant: Amount } | null {
  if (magnitude(value) === 0 || plan.quantity.asked.whole) return null;
  for (const power of prefixPowers) {
    const meant = shifted(value, power);
    const right = matchKeys(plan, meant, keys, marking);
    if (right === null || right.flagged === true) continue;
    const cost = marking.unitCharged ? 0 : marking.policy.unitMistakeCosts;
    const says = `What went wrong: the value is 1${'\u202f000'.repeat(Math.abs(power) / 3)} times too ${power > 0 ? 'small' : 'large'}, a prefix or unit mistake${marking.unitCharged ? ' that has cost its mark already' : ''}.`;
    return { outcome: { ...right, awarded: Math.max(0, right.awarded - cost), verdict: 'misstep', rule: 'prefix', unitSlip: true, says }, meant };
  }
  return null;
}

const unreadOutcome = (code: string, says: string, hasWorking: boolean): Outcome => {
  if (code === 'blank' && !hasWorking) return { awarded: 0, verdict: 'blank', rule: 'blank', says: 'Nothing was written here.' };
  if (hasWorking) return { awarded: 0, verdict: 'for-marker', rule: 'working', says: `${says} The working goes to a marker.` };
  return code === 'dimension' ? { awarded: 0, verdict: 'wrong', rule: 'dimension', says } : { awarded: 0, verdict: 'unread', rule: 'unread', says };
};

/** A right answer whose unit is missing loses the unit mark where the policy says so, once a question. */
const missingUnit = (outcome: Outcome, reading: Read, { policy, unitCharged }: Marking): Outcome => {
  if (reading.unitGiven || policy.unitMissing === 'read' || outcome.awarded === 0 || outcome.unitSlip === true) return outcome;
  const cost = unitCharged ? 0 : policy.unitMistakeCosts;
  return { ...outcome, awarded: Math.max(0, outcome.awarded - cost), unitSlip: true, says: `${outcome.says} The unit is missing${unitCharged ? ', which has cost its mark already' : ''}.` };
};

const noMatch = (plan: NumberPlan, marking: Marking): Outcome =>
  plan.working && marking.working.trim() !== ''
    ? { awarded: 0, verdict: 'for-marker', rule: 'working', says: 'The value is not right; the working goes to a marker.' }
    : { awarded: 0, verdict: 'wrong', rule: 'no-match', says: `Not right: the key is ${marking.drawn.key.text}.` };

/**
 * Marks a typed number: against the key, against the key recomputed from the candidate's own earlier values, against the
 * known missteps, and against a slip of a power of a thousand.
 */
export function markNumber(plan: NumberPlan, marking: Marking): Marked {
  const { drawn, policy, notation } = marking;
  const { quantity } = plan;
  const base = { part: drawn.part, of: drawn.marks, key: drawn.key };
  const reading = readNumber(marking.answer, {
    unit: quantity.unit, notation, ratio: plan.ratio, form: quantity.asked.complex ? 'complex' : 'real', unitMissing: policy.unitMissing,
  });
  if (!reading.ok) return { marking: { ...base, ...unreadOutcome(reading.code, reading.says, plan.working && marking.working.trim() !== '') }, carries: [] };
  const value: Amount = quantity.asked.complex ? { re: reading.value, im: reading.imaginary ?? 0 } : reading.value;
  const reads = { value, unit: quantity.unit.code, text: `${reading.shown.value} ${reading.shown.unit}`.trim() };
  const keys = keysOf(plan, marking);
  const direct = matchKeys(plan, value, keys, marking) ?? matchMissteps(plan, value, marking);
  const slip = direct === null ? matchPrefix(plan, value, keys, marking) : null;
  const outcome = missingUnit(direct ?? slip?.outcome ?? noMatch(plan, marking), reading, marking);
  return {
    marking: { ...base, ...outcome, reads },
    carries: slip === null ? [value] : [value, slip.meant],
    absurd: isAbsurd(value, quantity.limits),
    chargesUnit: outcome.unitSlip === true,
  };
}
