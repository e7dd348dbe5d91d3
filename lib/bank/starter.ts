import { stringify } from 'yaml';
import type { NewTemplateInput } from './model';

const quoted = (text: string): string => stringify(text, { lineWidth: 0 }).trimEnd();

/** The text that a new template begins with: it reads, draws and shows each section once. */
export const starterText = (input: NewTemplateInput): string => `template: ${input.slug}
language: 1
title: ${quoted(input.title)}
area: ${quoted(input.area)}
level: ${input.level}
minutes: 3
conventions: [conventional-current]
cautions: ${input.caution === '' ? '[]' : `[${quoted(input.caution)}]`}

given:                       # what is drawn, in the order of the rating plate
  V: { label: Supply voltage, unit: V, choose: [120, 208, 240] }
  R: { label: Load resistance, unit: ohm, range: [8, 60], step: 0.5 }

require: []                  # a draw that breaks one is thrown away

stem: |
  A resistance of {{R}} is connected to a {{V}} supply.

parts:
  - part: a
    kind: number
    ask: Find the current.
    key: V / R
    unit: A
    marks: 1
    missteps:
      - { key: R / V, says: resistance divided by voltage }

solution: |
  $I = \\dfrac{V}{R} = {{part.a}}$
`;
