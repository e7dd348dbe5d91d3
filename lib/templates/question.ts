import { blocksOf } from './blocks';
import { conventionText } from './conventions';
import type { Draw } from './draw';
import { blocksHtml, escapeHtml, inlineHtml } from './html';
import type { SeenPart } from './kinds/kind';
import { marksOf, type Template } from './plan';
import { plateOf } from './plate';
import { textBlocks } from './text-blocks';

/** `symbol` as written, R_a: what follows the underscore is printed lowered. */
export interface PlateCell { label: string; symbol?: string; value: string; unit: string }
export interface QuestionPart extends SeenPart { part: string; kind: string; askHtml: string; marks: number; working: boolean }

/** What a candidate may see of a draw, as plain JSON: no title, seed, key, formula or misstep is in it. */
export interface Question {
  marks: number;
  minutes: number;
  conventions: string[];
  cautions: { title: string; html: string }[];
  plate: PlateCell[];
  stemHtml: string;
  parts: QuestionPart[];
}

const htmlOf = (template: Template, draw: Draw, text: string): string => blocksHtml(textBlocks(template, draw, text));
const lineOf = (template: Template, draw: Draw, text: string): string => inlineHtml(textBlocks(template, draw, text));

/** Cautions as they stand on papers and solutions: title, and text as HTML. */
export const cautionsOf = (template: Template): { title: string; html: string }[] =>
  template.cautions.map(({ title, text }) => ({ title, html: blocksHtml(blocksOf(text, () => null)) }));

/** The question of a draw as a candidate may see it. */
export function toQuestion(template: Template, draw: Draw): Question {
  const { head, plan } = template;
  return {
    marks: marksOf(template),
    minutes: head.minutes,
    conventions: head.conventions.map(conventionText),
    cautions: cautionsOf(template),
    plate: plateOf(template, draw).map(({ symbol, ...cell }) => (symbol === '' ? cell : { ...cell, symbol })),
    stemHtml: htmlOf(template, draw, head.stem),
    parts: plan.parts.flatMap((part, index) => {
      const drawn = draw.parts[index];
      if (drawn === undefined) return [];
      const seen = part.see(drawn, (text, isTemplateText) => (isTemplateText ? lineOf(template, draw, text) : escapeHtml(text)));
      return [{ part: part.part, kind: part.kind, askHtml: lineOf(template, draw, part.ask), marks: part.marks, working: part.working, ...seen }];
    }),
  };
}
