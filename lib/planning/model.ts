import { z } from 'zod';

const oneLine = (most: number, missing: string) =>
  z.string().trim().min(1, missing).max(most, `At most ${most} characters.`).regex(/^[^\r\n]*$/, 'Keep it on one line.');
/** What a date-and-time field holds: a time in the school's zone. */
const localTime = z.string().regex(/^\d{4}-\d{2}-\d{2}T\d{2}:\d{2}(:\d{2})?$/, 'Give a date and a time.');

const times = {
  room: oneLine(60, 'Give the room.'),
  /** Check-in opens. */
  opensAt: localTime,
  startsAt: localTime,
  latestStartAt: localTime,
  proctors: z.array(z.guid()).max(40),
};
const inOrder = (plan: { opensAt: string; startsAt: string; latestStartAt: string }, context: z.RefinementCtx): void => {
  if (plan.opensAt > plan.startsAt) context.addIssue({ code: 'custom', path: ['opensAt'], message: 'Check-in opens before the start, or with it.' });
  if (plan.latestStartAt < plan.startsAt) context.addIssue({ code: 'custom', path: ['latestStartAt'], message: 'The latest start is not before the start.' });
};

export const newSitting = z
  .strictObject({ formId: z.guid('Choose a form.'), classId: z.guid('Choose a class.'), title: oneLine(120, 'Give the sitting a title.'), ...times })
  .superRefine(inOrder);
export type NewSitting = z.infer<typeof newSitting>;

export const sittingChange = z.strictObject({ title: oneLine(120, 'Give the sitting a title.'), ...times }).superRefine(inOrder);
export type SittingChange = z.infer<typeof sittingChange>;

export const seatLabel = z.string().trim().max(12, 'At most 12 characters.').regex(/^[^\r\n]*$/);
export const seatList = z.array(z.strictObject({ candidateId: z.guid(), seat: seatLabel })).max(500);
export type SeatList = z.infer<typeof seatList>;

export const paperStates = ['none', 'drawing', 'drawn', 'failed'] as const;
export type PaperState = (typeof paperStates)[number];

/** What an accommodation gives; several that are valid on a day give the most of each. */
export type Allowance = {
  /** Extra time as a share of the time allowed [%]. */
  extraPercent: number;
  /** Extra time [min]. */
  extraMinutes: number;
  /** Rest breaks that stop the clock, in all [min]. */
  restMinutes: number;
  largePrint: boolean;
  separateRoom: boolean;
};
