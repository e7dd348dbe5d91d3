import { notationOf } from '@/lib/numeric/notation';
import { printShortest } from '@/lib/numeric/printer';
import { roundToFigures } from '@/lib/numeric/digits';
import { findUnit } from '@/lib/numeric/units';
import { streamOf } from '@/lib/numeric/stream';
import type { Draw } from '@/lib/templates/draw';
import type { DrawnPart } from '@/lib/templates/kinds/kind';

/** How a simulated candidate works: share of parts right, of known wrong ways, of blanks; the rest are slips. */
export type Hand = { right: number; misstep: number; blank: number };

/** Hands from very good to weak; a class has some of each. */
export const hands: readonly Hand[] = [
  { right: 0.97, misstep: 0.03, blank: 0 }, { right: 0.86, misstep: 0.1, blank: 0.01 }, { right: 0.78, misstep: 0.14, blank: 0.03 },
  { right: 0.66, misstep: 0.2, blank: 0.05 }, { right: 0.48, misstep: 0.3, blank: 0.12 },
];

/** A number as a candidate writes it: four figures and its unit. */
function written(value: number, part: DrawnPart, locale: string): string {
  const unit = findUnit(part.unit ?? 'none')?.symbol ?? '';
  return `${printShortest(roundToFigures(value, 4), notationOf(locale))} ${unit}`.trim();
}

function answerTo(part: DrawnPart, hand: Hand, chance: () => number, locale: string): string {
  const draw = chance();
  const pick = <Item>(items: readonly Item[]): Item | undefined => items[Math.floor(chance() * items.length)];
  if (draw < hand.blank) return '';
  const right = draw < hand.blank + hand.right;
  if (part.options) {
    const wanted = part.options.filter((option) => option.right === right);
    return (pick(wanted) ?? part.options[0])?.option ?? '';
  }
  const key = part.key.value;
  if (typeof key !== 'number') return '';
  if (right) return written(key, part, locale);
  const missteps = part.missteps.filter((misstep) => typeof misstep.value === 'number');
  if (draw < hand.blank + hand.right + hand.misstep && missteps.length > 0) return written(pick(missteps)?.value as number, part, locale);
  // A slip: a wrong factor, a lost minus, a unit with the wrong prefix.
  const slip = chance();
  return slip < 0.2 ? written(key * 1000, part, locale) : written(key * (0.6 + chance() * 0.3), part, locale);
}

/** What a simulated candidate answers to one drawn question; the same seed always gives the same answers. */
export function simulate(draw: Draw, hand: Hand, seed: string): { part: string; answer: string }[] {
  const chance = streamOf(seed, `answers ${draw.seed}`, 0);
  return draw.parts.map((part) => ({ part: part.part, answer: answerTo(part, hand, chance, draw.locale) }));
}
