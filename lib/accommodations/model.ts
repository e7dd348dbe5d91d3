import { z } from 'zod';
import { day } from '@/lib/classes/model';

const minutes = (most: number) => z.number('Give a number, or 0.').int('Give whole minutes.').min(0, 'Give 0 or more.').max(most, `At most ${most} minutes.`);

const fields = z.object({
  /** Share of the time allowed, added to it [%]. */
  extraPercent: z.number('Give a number, or 0.').min(0, 'Give 0 or more.').max(300, 'At most 300 per cent.').multipleOf(0.1, 'At most one decimal.'),
  /** Added to the time allowed [min]. */
  extraMinutes: minutes(600),
  /** Rest breaks in all, with the clock stopped [min]. */
  restMinutes: minutes(240),
  largePrint: z.boolean(),
  separateRoom: z.boolean(),
  reason: z.string().max(500, 'Use at most 500 characters.'),
  since: day,
  until: z.union([z.literal(''), day]),
});

/** At least one need, and dates in order. The reason is for the registrar alone. */
export const accommodationSchema = fields
  .refine((value) => value.extraPercent > 0 || value.extraMinutes > 0 || value.restMinutes > 0 || value.largePrint || value.separateRoom, {
    message: 'Say what is needed: time, rest, large print or a separate room.',
    path: ['extraPercent'],
  })
  .refine((value) => value.until === '' || value.until >= value.since, { message: 'The last day is before the first.', path: ['until'] });
export type AccommodationInput = z.infer<typeof accommodationSchema>;

export type AccommodationRow = {
  id: string;
  /** In words, as a proctor sees it. */
  need: string;
  reason: string;
  since: string;
  until: string | null;
  givenBy: string;
  givenAt: Date;
  endedAt: Date | null;
};

type Need = Pick<AccommodationInput, 'extraPercent' | 'extraMinutes' | 'restMinutes' | 'largePrint' | 'separateRoom'>;

/** "+25 %, rest 15 min, large print": the need in words, never the reason. */
export const needInWords = (need: Need): string =>
  [
    need.extraPercent > 0 && `+${need.extraPercent} %`,
    need.extraMinutes > 0 && `+${need.extraMinutes} min`,
    need.restMinutes > 0 && `rest ${need.restMinutes} min`,
    need.largePrint && 'large print',
    need.separateRoom && 'separate room',
  ]
    .filter(Boolean)
    .join(', ');
