import { z } from 'zod';
import type { PassRule } from '@/lib/exams/model';
import type { PartMarking } from '@/lib/templates/kinds/kind';

export const resultStates = ['provisional', 'moderated', 'released', 'sealed', 'amended'] as const;
export type ResultState = (typeof resultStates)[number];

export const outcomes = ['pass', 'not passed', 'absent', 'second marker'] as const;
export type Outcome = (typeof outcomes)[number];

/** Marks of a section, an area or the whole; `percent` is rounded as the pass rule says. */
export type Share = { awarded: number; of: number; percent: number };
export type AreaShare = Share & { area: string; title: string };
export type SectionShare = Share & { title: string; areas: AreaShare[] };
export type Breakdown = { sections: SectionShare[]; areas: AreaShare[] };

/** One condition of a pass: figures wanted and had, in per cent. */
export type AppliedRule = { says: string; wanted: number; had: number; met: boolean };
export type RuleApplied = { rounding: PassRule['rounding']; rules: AppliedRule[] };

/** A candidate's result without its history. */
export type Totals = { total: number; of: number; percent: number; outcome: Outcome; breakdown: Breakdown; rule: RuleApplied };

/** Marks of one part as they count now. */
export type PartMark = {
  question: number;
  part: string;
  issue: number;
  awarded: number;
  of: number;
  verdict: PartMarking['verdict'];
  /** Code of the rule that awarded the marks. */
  rule: string;
  answer: string;
  reads: PartMarking['reads'] | null;
  key: PartMarking['key'];
  says: string;
  /** Who marked it, and why; empty where the marking was automatic. */
  marker: string;
  reason: string;
};

/** What each rule of marking means, for staff. */
export const ruleSays: Readonly<Record<string, string>> = {
  key: 'matches the key',
  'own-rounding': 'matches the key recomputed from the candidate’s own rounded values',
  'follow-through': 'matches the key recomputed from the candidate’s own earlier value',
  'absurd-carried': 'follows from an impossible earlier value',
  misstep: 'a known misstep',
  prefix: 'out by a power of a thousand',
  'no-match': 'matches neither the key nor a known misstep',
  dimension: 'has the unit of another kind of quantity',
  working: 'the working goes to a marker',
  blank: 'nothing was written',
  unread: 'cannot be read as an answer',
  person: 'decided by a marker',
};

const reason = z.string().trim().min(3, 'Say why, in a few words.').max(500, 'At most 500 characters.');

/** A marker's decision on one part. */
export const overrideInput = z.strictObject({
  candidateId: z.guid(),
  question: z.number().int().min(1).max(200),
  part: z.string().regex(/^[a-z][a-z0-9_]*$/).max(30),
  /** The issue of the mark that the marker looked at. */
  issue: z.number().int().min(1),
  awarded: z.number('Give the marks as a number.').min(0, 'Not below 0.').multipleOf(0.25, 'In quarters of a mark.'),
  reason,
});
export type OverrideInput = z.infer<typeof overrideInput>;

/** A person's decision on an answer that came after the end. */
export const claimInput = z.strictObject({
  candidateId: z.guid(),
  question: z.number().int().min(1).max(200),
  part: z.string().regex(/^[a-z][a-z0-9_]*$/).max(30),
  sequence: z.number().int().min(1),
  decision: z.enum(['taken', 'left out']),
  reason,
});
export type ClaimInput = z.infer<typeof claimInput>;

export const withholdInput = z.strictObject({ candidateId: z.guid(), withheld: z.boolean(), reason });
export type WithholdInput = z.infer<typeof withholdInput>;
