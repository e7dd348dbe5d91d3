import { z } from 'zod';
import { markingPolicySchema } from '@/lib/marking/policy';

export const examStates = ['draft', 'in review', 'approved', 'retired'] as const;
export type ExamState = (typeof examStates)[number];

/** Where numbers are printed and read: it decides the decimal mark and the thousands gap. */
export const locales = ['en-CA', 'en-GB', 'en-US', 'en-ZA', 'en-AU', 'en-IE', 'de-DE', 'fr-CA'] as const;

const oneLine = (most: number) => z.string().trim().max(most, `At most ${most} characters.`).regex(/^[^\r\n]*$/, 'Keep it on one line.');
const words = (most: number) => z.string().max(most, `At most ${most} characters.`);
const percent = z.number('Give a figure from 0 to 100.').min(0, 'From 0 to 100.').max(100, 'From 0 to 100.');

/** A template chosen for the exam, at one of its versions. */
export const examItem = z.strictObject({ templateId: z.guid(), versionId: z.guid() });

export const examSection = z.strictObject({
  title: oneLine(80),
  instructions: words(2_000),
  /** Least share of this section's marks for a pass [%]; null where the rule asks none. */
  leastPercent: percent.nullable(),
  items: z.array(examItem).max(60),
});
export type ExamSection = z.infer<typeof examSection>;

/** Marks wanted for an area at a level. */
export const blueprintRow = z.strictObject({
  area: z.string().min(1, 'Choose an area.').max(60),
  level: z.number('Give a level.').int().min(1, 'From 1 to 9.').max(9, 'From 1 to 9.'),
  marks: z.number('Give the marks wanted.').min(0, 'Not below 0.').max(1_000),
});

export const roundings = ['none', 'tenth', 'whole'] as const;
export const roundingSays: Record<(typeof roundings)[number], string> = {
  none: 'not rounded: 69.96 % stays below 70 %',
  tenth: 'rounded to one decimal, half up: 69.95 % counts as 70.0 %',
  whole: 'rounded to whole per cent, half up: 69.5 % counts as 70 %',
};

export const passRule = z.strictObject({
  /** Least share of all marks for a pass [%]. */
  overallPercent: percent,
  rounding: z.enum(roundings),
});
export type PassRule = z.infer<typeof passRule>;

export const calculators = ['none', 'non-programmable', 'any'] as const;
export const materials = z.strictObject({
  calculator: z.enum(calculators),
  formulaSheet: z.boolean(),
  codeBook: z.boolean(),
  /** Anything else that may lie on the bench, one line each. */
  other: words(600),
});
export type Materials = z.infer<typeof materials>;

export const examContent = z.strictObject({
  cover: z.strictObject({ instructions: words(6_000), declaration: words(2_000) }),
  sections: z.array(examSection).max(20),
  blueprint: z.array(blueprintRow).max(60),
  /** Time allowed [min]; 0 while it is not decided. */
  minutes: z.number('Give the time allowed in minutes.').int('Whole minutes.').min(0).max(600, 'At most 600 minutes.'),
  passRule,
  materials,
  formulaSheet: words(12_000),
  marking: markingPolicySchema,
  locale: z.enum(locales),
});
export type ExamContent = z.infer<typeof examContent>;

export const examTitle = oneLine(120).min(1, 'Give the exam a title.');
/** What the exam's sheet sends: everything, with the revision it was read at. */
export const examSheet = z.strictObject({ title: examTitle, revision: z.number().int(), content: examContent });
export type ExamSheet = z.infer<typeof examSheet>;

/** What the rest of the program may know of one template version that stands, or may stand, on an exam. */
export type VersionFacts = {
  templateId: string;
  versionId: string;
  slug: string;
  title: string;
  area: string;
  level: number;
  /** Version number of this template. */
  number: number;
  marks: number;
  /** Expected working time [min]. */
  minutes: number;
  parts: number;
  kinds: string[];
  /** May it stand on a form now? */
  usable: boolean;
  /** The newest approved version of the same template, where this one is older. */
  newer: { versionId: string; number: number } | null;
};

/** An exam as it begins: one empty section, the school's own rule and declaration. */
export function emptyExam(school: { locale: ExamContent['locale']; passPercent: number; sectionPercent: number; declaration: string; unitMissing: 'read' | 'lose' }): ExamContent {
  return {
    cover: { instructions: '', declaration: school.declaration },
    sections: [{ title: '', instructions: '', leastPercent: school.sectionPercent || null, items: [] }],
    blueprint: [],
    minutes: 0,
    passRule: { overallPercent: school.passPercent, rounding: 'none' },
    materials: { calculator: 'non-programmable', formulaSheet: false, codeBook: false, other: '' },
    formulaSheet: '',
    marking: markingPolicySchema.parse({ unitMissing: school.unitMissing }),
    locale: school.locale,
  };
}
