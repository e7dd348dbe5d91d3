import { z } from 'zod';
import { excusable } from './problem';

/** Limits of printed text [characters]: more does not fit a paper, a plate or a table. */
export const longest = { title: 120, label: 48, symbol: 12, ask: 600, option: 200, stem: 2400, solution: 8000, says: 300, expression: 600 } as const;

const slug = z.string().regex(/^[a-z0-9]+(-[a-z0-9]+)*$/, 'must be lower-case words joined by hyphens, such as shunt-weakened-field').max(80);
export const nameText = z.string().regex(/^[A-Za-z][A-Za-z0-9_]*$/, 'must be a name: a letter, then letters, digits or _').max(24);
export const partId = z.string().regex(/^[a-z][a-z0-9_]*$/, 'must be a small letter, then small letters, digits or _').max(12);
export const symbolText = z.string().regex(/^([A-Za-z\u0370-\u03ff]{1,4}(_[A-Za-z0-9]{1,6})?'?)?$/, 'must be a symbol such as V, R_a or φ').max(longest.symbol);
const finite = z.number();
const pair = z.tuple([finite, finite]).refine(([lo, hi]) => lo < hi, 'must be [low, high] with low below high');

/** An expression as written; YAML reads a bare number or true/false as such, so those are taken too. */
export const expressionText = z.union([z.string().trim().min(1).max(longest.expression), finite, z.boolean()]).transform(String);
/** "0.5 percent" or "0.5 %", read as a fraction (0.005). */
export const percentText = z.string().regex(/^\d+(\.\d+)?\s*(percent|%)$/, 'must be a share such as "0.5 percent"').transform((text) => Number.parseFloat(text) / 100);

export const givenText = z.strictObject({
  label: z.string().trim().min(1),
  symbol: symbolText.optional(),
  unit: z.string().optional(),
  choose: z.array(z.union([finite, z.string().trim().min(1).max(40)])).min(1).max(500).optional(),
  range: pair.optional(),
  step: finite.positive().optional(),
  series: z.string().optional(),
  column: z.string().optional(),
  decimals: z.int().min(0).max(6).optional(),
});
export type GivenText = z.infer<typeof givenText>;

const declaredDerived = z.strictObject({
  key: expressionText,
  unit: z.string(),
  decimals: z.int().min(0).max(8).optional(),
  figures: z.int().min(1).max(8).optional(),
  label: z.string().trim().min(1).optional(),
  symbol: symbolText.optional(),
  'trade-constant': z.string().trim().min(1).max(longest.says).optional(),
}).refine((derived) => (derived.decimals === undefined) !== (derived.figures === undefined), 'needs decimals or figures, one of them: a printed value is rounded before it is used');
export const derivedText = z.union([expressionText, declaredDerived]);
export type DerivedText = z.infer<typeof derivedText>;

export const acceptText = z.union([
  z.literal('exact'),
  z.strictObject({ within: percentText.optional(), or: z.string().optional(), angle: z.string().optional() })
    .refine((accept) => accept.within !== undefined || accept.or !== undefined || accept.angle !== undefined, 'needs "within", "or" or both'),
]);
export type AcceptText = z.infer<typeof acceptText>;

export const misstepText = z.strictObject({
  key: expressionText,
  says: z.string().trim().min(1).max(longest.says),
  'separated-by': partId.optional(),
  earns: finite.nonnegative().optional(),
});
export type MisstepText = z.infer<typeof misstepText>;

/** What every part has, whatever its kind. */
export const anyPart = {
  part: partId,
  ask: z.string().trim().min(1),
  marks: finite.positive().max(100).multipleOf(0.5),
  working: z.boolean().optional(),
};

export const exampleText = z.strictObject({
  source: z.string().trim().min(1).max(400),
  obtained: z.enum(['read', 'memory']),
  given: z.record(nameText, z.union([finite, z.string()])),
  expect: z.record(partId, z.union([finite, z.string()])),
  within: percentText.default(0.01),
});
export type ExampleText = z.infer<typeof exampleText>;

/** The form of a template, without its parts: those come from the registry of kinds. */
export const templateHead = {
  template: slug,
  language: z.literal(1, 'must be 1, the version of this language'),
  title: z.string().trim().min(1),
  area: z.string(),
  level: z.int().min(1).max(9),
  minutes: finite.positive().max(240),
  conventions: z.array(z.string().trim().min(1).max(60)).max(8).default([]),
  cautions: z.array(z.string()).max(8).default([]),
  plate: z.strictObject({ table: z.string(), where: expressionText.optional() }).optional(),
  given: z.record(nameText, givenText),
  derive: z.record(nameText, derivedText).default({}),
  require: z.array(expressionText).max(40).default([]),
  stem: z.string().trim().min(1),
  solution: z.string().trim().min(1),
  examples: z.array(exampleText).max(20).default([]),
  reasons: z.partialRecord(z.enum(excusable), z.string().trim().min(1).max(longest.says)).default({}),
};
