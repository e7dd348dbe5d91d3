import type { Draw } from './draw';
import { fillText } from './print';
import type { Template } from './plan';

/** A draw with its texts, in the form of the page: what `bank draw` prints and an author sees. */
export interface DrawReport extends Omit<Draw, 'parts'> {
  stem: string;
  parts: (Draw['parts'][number] & { ask: string })[];
  solution: string;
}

/** Stem, questions and solution as Markdown with this draw's values in place. */
export const reportDraw = (template: Template, draw: Draw): DrawReport => ({
  template: draw.template, seed: draw.seed, redraws: draw.redraws, engine: draw.engine, locale: draw.locale, given: draw.given, derived: draw.derived,
  stem: fillText(template, draw, template.head.stem),
  parts: draw.parts.map((part, index) => ({ ...part, ask: fillText(template, draw, template.plan.parts[index]?.ask ?? '') })),
  solution: fillText(template, draw, template.head.solution),
});
