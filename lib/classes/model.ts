import { z } from 'zod';
import { oneLine, tidy } from '@/lib/people/model';

export const termStates = ['open', 'ended'] as const;
export type TermState = (typeof termStates)[number];

/** A calendar day, "2026-12-01". */
export const day = z.iso.date('Give a date.');

export const termSchema = z
  .object({ name: oneLine(80).refine((text) => tidy(text) !== '', 'Give the term a name.'), startsOn: day, endsOn: day })
  .refine((term) => term.endsOn >= term.startsOn, { message: 'The last day is before the first.', path: ['endsOn'] });
export type TermInput = z.infer<typeof termSchema>;

export const classSchema = z.object({
  termId: z.uuid('Choose a term.'),
  name: oneLine(40).refine((text) => tidy(text) !== '', 'Give the class a short name, such as EL2-B.'),
  title: oneLine(120),
  instructorIds: z.array(z.uuid()).max(20, 'At most 20 instructors.'),
});
export type ClassInput = z.infer<typeof classSchema>;

export type TermRow = { id: string; name: string; startsOn: string; endsOn: string; state: TermState; classes: number; students: number };
export type ClassRow = { id: string; name: string; title: string; termId: string; term: string; termState: TermState; instructors: string[]; students: number };
