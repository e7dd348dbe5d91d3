import { z } from 'zod';

const zones = new Set(Intl.supportedValuesOf('timeZone'));
const oneLine = (most: number) => z.string().trim().max(most).regex(/^[^\r\n]*$/, 'Keep it on one line.');

/** Everything a school decides once. Figures of any jurisdiction stand here, never in code. */
export const schoolSettings = z.object({
  zone: z.string().refine((zone) => zones.has(zone) || zone === 'UTC', 'Choose a time zone from the list, such as America/Edmonton.').default('UTC'),
  locale: z.enum(['en-CA', 'en-GB', 'en-US', 'en-ZA', 'en-AU', 'en-IE', 'de-DE', 'fr-CA']).default('en-CA'),
  office: oneLine(120).default(''),
  helpAddress: oneLine(200).default(''),
  senderName: oneLine(80).default(''),
  senderAddress: oneLine(200).default(''),
  passPercent: z.number().min(0).max(100).default(70),
  sectionPercent: z.number().min(0).max(100).default(0),
  totalDecimals: z.number().int().min(0).max(2).default(1),
  unitMissing: z.enum(['read', 'lose']).default('read'),
  graceSeconds: z.number().int().min(0).max(3600).default(120),
  candidatesPerProctor: z.number().int().min(1).max(200).default(30),
  invitationDays: z.number().int().min(1).max(60).default(14),
  resetHours: z.number().int().min(1).max(72).default(2),
  slipHours: z.number().int().min(1).max(240).default(24),
  attachReports: z.boolean().default(false),
  declaration: z.string().max(2000).default('The work I hand in is my own. I have read the instructions and the materials allowed.'),
});
export type SchoolSettings = z.infer<typeof schoolSettings>;

export const schoolForm = schoolSettings.required().extend({ name: oneLine(120).min(1, 'Give the school a name.'), version: z.number().int() });
export type SchoolInput = z.infer<typeof schoolForm>;
export type School = { name: string; version: number; settings: SchoolSettings };
