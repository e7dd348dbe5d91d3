import { z } from 'zod';
import { choiceKind } from './choice';
import type { Build, PartPlan } from './kind';
import { numberKind } from './number';

/** The parts of a template as written: one form a kind. A new kind is a module of its own and a line here and below. */
export const partText = z.discriminatedUnion('kind', [numberKind.schema, choiceKind.schema]);
export type PartText = z.output<typeof partText>;

export const kindNames: readonly string[] = [numberKind.kind, choiceKind.kind];

/** Makes a part ready through the module of its kind; null after a complaint that leaves nothing to work with. */
export function buildPart(text: PartText, build: Build): PartPlan | null {
  switch (text.kind) {
    case 'number':
      return numberKind.build(text, build);
    case 'choice':
      return choiceKind.build(text, build);
  }
}
