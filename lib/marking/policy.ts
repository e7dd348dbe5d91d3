import { z } from 'zod';

/** Default tolerances of parts that state none; see template-language, Tolerance. */
export const tolerancesSchema = z.strictObject({
  /** share of the key */
  relative: z.number().min(0).max(0.2).default(0.01),
  /** share of the key where four or more figures are asked */
  closer: z.number().min(0).max(0.2).default(0.005),
  /** percentage points, for parts in percent */
  percentPoints: z.number().min(0).max(10).default(0.2),
  /** degrees, for parts in degrees and the angle of a complex quantity */
  degrees: z.number().min(0).max(10).default(0.5),
});
export type Tolerances = z.infer<typeof tolerancesSchema>;

/** How an exam marks. */
export const markingPolicySchema = z.strictObject({
  tolerances: tolerancesSchema.prefault({}),
  /** An answer without a unit is read in the unit asked for, or loses the unit mark. */
  unitMissing: z.enum(['read', 'lose']).default('read'),
  /** Marks that a unit mistake costs, once a question. */
  unitMistakeCosts: z.number().min(0).max(10).default(1),
  /** Share of a part's marks that a value carried through from an earlier slip earns. */
  carriedShare: z.number().min(0).max(1).default(1),
  /** Share of a part's marks that a wrong option takes away; 0 unless the exam says so. */
  wrongOptionCosts: z.number().min(0).max(1).default(0),
});
export type MarkingPolicy = z.infer<typeof markingPolicySchema>;

export const defaultPolicy: MarkingPolicy = markingPolicySchema.parse({});
