import { createHash } from 'node:crypto';
import { z } from 'zod';
import { canonical } from '@/lib/audit/model';

const line = z.string();
const share = z.strictObject({ title: line, awarded: line, of: line, percent: line });

/** What a grade report says, as printed: figures are texts in the school's notation. The digest is over this and nothing else. */
export const reportContent = z.strictObject({
  document: z.literal('grade report'),
  version: z.literal(1),
  school: z.strictObject({ name: line, office: line, address: line }),
  candidate: z.strictObject({ name: line, learnerNumber: line }),
  className: line,
  exam: line,
  form: line,
  sitting: line,
  sat: line,
  attempt: line,
  outcome: z.enum(['pass', 'not passed', 'absent']),
  /** "–" where the candidate was absent. */
  total: line,
  of: line,
  percent: line,
  passAt: line,
  sections: z.array(share.extend({ areas: z.array(share) })),
  rules: z.array(z.strictObject({ says: line, had: line, met: z.boolean() })),
  sentence: line,
  sealed: line,
  issued: z.strictObject({ at: z.iso.datetime(), says: line }),
  issue: z.number().int(),
  supersedes: line,
  /** Head of the sealed log when the report was issued; null before its first block. */
  log: z.strictObject({ block: z.number().int(), digest: line }).nullable(),
  code: line,
});
export type ReportContent = z.infer<typeof reportContent>;

/** SHA-256 [hex] of the canonical content. */
export const reportDigest = (content: ReportContent): string => createHash('sha256').update(canonical(content)).digest('hex');

/** Letters and figures that nobody takes for one another. */
export const codeAlphabet = '23456789ABCDEFGHJKMNPQRSTVWXYZ';

export const attempts = ['first', 'second', 'third', 'fourth', 'fifth', 'sixth'] as const;
/** The nth attempt at an exam in words, from 1. */
export const attemptSays = (number: number): string => attempts[number - 1] ?? `number ${number}`;
