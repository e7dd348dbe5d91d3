import type { Draw } from './draw';
import { Tally } from './kinds/tally';
import { placeholdersIn } from './placeholders';
import type { Template } from './plan';
import type { Problem } from './problem';

/** Derived values that stand on the question before it is answered: on the plate, or in stem or questions. */
const shownDerived = ({ head, plan }: Template): string[] => {
  const named = new Set([head.stem, ...plan.parts.map(({ ask }) => ask)].flatMap(placeholdersIn));
  return plan.derived.filter(({ name, declared }) => declared !== null && (declared.label !== undefined || named.has(name))).map(({ name }) => name);
};

/** Finds printed derived values that are a part's key: the question would answer itself. */
export class Leaks {
  private readonly shown: readonly string[];
  private readonly tallies = new Map<string, { name: string; part: string; tally: Tally }>();
  private draws = 0;

  constructor(template: Template) {
    this.shown = shownDerived(template);
  }

  look(draw: Draw): void {
    this.draws += 1;
    for (const name of this.shown) {
      const derived = draw.derived[name];
      for (const { part, unit, carries, accept } of draw.parts) {
        if (typeof derived?.value !== 'number' || typeof carries !== 'number' || unit !== derived.unit) continue;
        if (Math.abs(derived.value - carries) > Math.max(accept.tolerance, 1e-9 * Math.abs(carries))) continue;
        const id = `${name} ${part}`;
        const row = this.tallies.get(id) ?? { name, part, tally: new Tally() };
        this.tallies.set(id, row);
        row.tally.add(draw.seed);
      }
    }
  }

  finish(): Problem[] {
    return [...this.tallies.values()].filter(({ tally }) => tally.count > this.draws / 2).map(({ name, part, tally }) => ({
      code: 'placeholder', part, count: tally.count, share: tally.count / this.draws, seeds: tally.seeds,
      says: `${name} is printed with the question and is the answer to part ${part}: leave out its label and do not print it in stem or question.`,
    }));
  }
}
