import { z } from 'zod';
import type { Expression } from '@/lib/expressions/compile';
import { markChoice } from '@/lib/marking/choice';
import { anyPart, expressionText, longest, misstepText } from '../model';
import { buildComputed } from './choice-computed';
import type { Build, Drawing, DrawnPart, Examiner, Kind, Scope } from './kind';
import { type ChoicePlan, keyOf, shuffled } from './options';
import { quantityText } from './quantity';

const listed = z.strictObject({
  text: z.string().trim().min(1),
  right: expressionText,
  says: z.string().trim().min(1).max(longest.says).optional(),
  earns: z.number().nonnegative().optional(),
});
const schema = z.strictObject({
  ...anyPart,
  kind: z.literal('choice'),
  options: z.union([z.literal('computed'), z.array(listed).min(2).max(8)]),
  ...quantityText,
  key: quantityText.key.optional(),
  unit: quantityText.unit.optional(),
  missteps: z.array(misstepText).max(7).default([]),
});
type ChoiceText = z.output<typeof schema>;
type Listed = z.output<typeof listed>;

interface Row { text: string; says?: string; earns: number; right: boolean | Expression }

const rowsOf = (texts: readonly Listed[], build: Build): Row[] =>
  texts.flatMap((text, index) => {
    build.text(text.text, ['options', index, 'text'], longest.option);
    const stated = { true: true, false: false }[text.right];
    const right = stated ?? build.expression(text.right, ['options', index, 'right']);
    return right === null ? [] : [{ text: text.text, says: text.says?.replace(/\.$/, ''), earns: text.earns ?? 0, right }];
  });

const holds = ({ right }: Row, scope: Scope): boolean => (typeof right === 'boolean' ? right : right.evaluate(scope) === true);

const examinerOf = (): Examiner => ({
  look({ drawn }, _, note) {
    const options = drawn.options ?? [];
    const right = options.filter((option) => option.right).length;
    if (right !== 1) note('right-count', `${right} options are right where exactly one should be.`);
    if (new Set(options.map((option) => option.text)).size < options.length) note('options-close', 'Two options are printed alike.');
  },
  finish: () => [],
});

const drawListed = (text: ChoiceText, rows: readonly Row[], drawing: Drawing): DrawnPart => {
  const options = shuffled(text.part, rows.map((row, source) => ({
    text: drawing.fill(row.text), right: holds(row, drawing.scope), source,
    ...(row.says === undefined ? {} : { says: row.says }), ...(row.earns === 0 ? {} : { earns: row.earns }),
  })), drawing);
  return { part: text.part, kind: 'choice', marks: text.marks, key: keyOf(options), accept: { tolerance: 0 }, options, missteps: [] };
};

const agreesListed = (rows: readonly Row[], scope: Scope, published: string): true | string => {
  const right = rows.filter((row) => holds(row, scope)).map((row) => row.text);
  return right.length === 1 && right[0] === published.trim() ? true : `the right option is "${right.join('", "')}" where "${published}" was published`;
};

function buildListed(text: ChoiceText & { options: Listed[] }, build: Build): ChoicePlan {
  for (const field of ['key', 'unit', 'accept', 'limits'] as const)
    if (text[field] !== undefined) build.complain('schema', `"${field}" is for computed options; listed ones say right: true or false.`, [field]);
  if (text.missteps.length > 0) build.complain('schema', 'Missteps are for computed options; a listed option has a "says" of its own.', ['missteps']);
  const rows = rowsOf(text.options, build);
  const plan: ChoicePlan = {
    part: text.part, kind: 'choice', ask: text.ask, marks: text.marks, working: text.working ?? false, unit: null,
    uses: [...new Set(rows.flatMap(({ right }) => (typeof right === 'boolean' ? [] : right.parts)))],
    value: () => undefined,
    roundedValue: () => undefined,
    draw: (drawing) => drawListed(text, rows, drawing),
    print: () => ({ text: '', tex: '' }),
    see: (drawn, render) => ({ options: (drawn.options ?? []).map(({ option, source }) => ({ option, html: render(rows[source]?.text ?? '', true) })) }),
    examiner: examinerOf,
    rightFor: (scope) => rows.flatMap((row, source) => (holds(row, scope) ? [source] : [])),
    mark: (marking) => markChoice(plan, marking),
    agrees: (scope, published) => agreesListed(rows, scope, published),
  };
  return plan;
}

function build(text: ChoiceText, around: Build): ChoicePlan | null {
  const { options } = text;
  if (options !== 'computed') return buildListed({ ...text, options }, around);
  const { key, unit } = text;
  if (key === undefined || unit === undefined) {
    around.complain('schema', 'Computed options need a key and a unit.', ['options']);
    return null;
  }
  return buildComputed({ ...text, key, unit }, around);
}

export const choiceKind: Kind<typeof schema> = { kind: 'choice', schema, build };
