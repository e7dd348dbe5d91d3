import { z } from 'zod';

export const templateStates = ['draft', 'in review', 'approved', 'retired'] as const;
export type TemplateState = (typeof templateStates)[number];

export const checkStates = ['queued', 'running', 'in order', 'problems', 'cancelled', 'failed'] as const;
export type CheckState = (typeof checkStates)[number];
export const isUnderWay = (state: CheckState): boolean => state === 'queued' || state === 'running';

export const verdicts = ['approved', 'returned', 'taken back'] as const;
export type Verdict = (typeof verdicts)[number];

/** Draws that a check must have made before a review may be asked for. */
export const drawsForReview = 2_000;
/** Draws that a check may be asked to make. */
export const drawChoices = [500, 2_000, 10_000] as const;
/** What may be stored as a working text [characters]: more than the language admits, so that a text too long is kept too. */
export const longestKept = 200_000;
/** Files that may be brought in at once. */
export const mostFiles = 200;

const printable = (text: string): boolean => !text.includes('\u0000');
export const templateText = z
  .string()
  .max(longestKept, `The text is longer than ${longestKept.toLocaleString('en')} characters: shorten it or split it.`)
  .refine(printable, 'The text holds a NUL character, which cannot be stored: remove it.');

export const slugText = z
  .string()
  .trim()
  .min(1, 'Give the template a slug: lower-case words joined by hyphens, such as shunt-weakened-field.')
  .max(80, 'Use at most 80 characters.')
  .regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'Use lower-case words joined by hyphens, such as shunt-weakened-field.')
  .refine((slug) => slug !== 'new', 'Choose another slug: this one is taken by the page for new templates.');

export const newTemplateInput = z.object({
  title: z.string().trim().min(1, 'Give the template a title.').max(120, 'Use at most 120 characters.').regex(/^[^\r\n]*$/, 'Keep it on one line.'),
  slug: slugText,
  area: z.string().min(1, 'Choose an area.'),
  /** A caution of the library to begin with; empty for none. */
  caution: z.string().max(80).default(''),
  level: z.coerce.number<string | number>().int('Choose a level.').min(1, 'Choose a level.').max(9, 'Choose a level.'),
});
export type NewTemplateForm = z.input<typeof newTemplateInput>;
export type NewTemplateInput = z.output<typeof newTemplateInput>;

const id = z.uuid();
export const saveInput = z.object({ id, text: templateText, revision: z.number().int().positive() });
export type SaveInput = z.infer<typeof saveInput>;

const note = z.string().trim().max(2_000, 'Use at most 2,000 characters.');
export const reviewInput = z.object({ id, revision: z.number().int().positive(), note });
export type ReviewInput = z.infer<typeof reviewInput>;

export const decisionInput = z
  .object({ versionId: id, verdict: z.enum(['approved', 'returned']), note })
  .refine((input) => input.verdict === 'approved' || input.note !== '', { path: ['note'], message: 'Say what has to change before you return it.' });
export type DecisionInput = z.infer<typeof decisionInput>;

export const checkInput = z.object({ id, draws: z.union(drawChoices.map((draws) => z.literal(draws))) });
export type CheckInput = z.infer<typeof checkInput>;
export const idInput = z.object({ id });

export const seedText = z.string().trim().min(1, 'Give a seed.').max(80, 'Use at most 80 characters.').refine(printable);
export const previewInput = z.object({ text: templateText, seed: seedText });
export type PreviewInput = z.infer<typeof previewInput>;

/** A file as it came: its name and what it holds. */
export type TemplateFile = { name: string; text: string };
/** What became of a file that was brought in. */
export type FileOutcome = { name: string; outcome: 'new' | 'changed' | 'same' | 'refused'; slug?: string; says: string };

/** What a text says of itself, once it parses. Marks and minutes as numbers; kinds in order of the parts. */
export type TemplateFacts = {
  slug: string;
  title: string;
  area: string;
  level: number;
  /** Expected working time [min]. */
  minutes: number;
  marks: number;
  kinds: string[];
  cautions: string[];
};

const words: Record<string, [one: string, many: string]> = {
  number: ['number', 'numbers'], choice: ['choice', 'choices'], choices: ['set of choices', 'sets of choices'], order: ['order', 'orders'],
  outcome: ['outcome', 'outcomes'], wiring: ['wiring', 'wirings'], written: ['written', 'written'],
};

/** "2 numbers, 1 choice": what a template asks for. */
export function kindsInWords(kinds: readonly string[]): string {
  const counts = new Map<string, number>();
  for (const kind of kinds) counts.set(kind, (counts.get(kind) ?? 0) + 1);
  return [...counts].map(([kind, count]) => `${count} ${(words[kind] ?? [kind, kind])[count === 1 ? 0 : 1]}`).join(', ');
}

/** A slug for a title: lower-case ASCII words joined by hyphens; empty when the title has none. */
export const slugOf = (title: string): string =>
  title.normalize('NFKD').replace(/[\u0300-\u036f]/g, '').toLowerCase().replace(/[^a-z0-9]+/g, '-').replace(/^-|-$/g, '').slice(0, 80).replace(/-$/, '');
