import type { Library } from '@/lib/templates/library';
import { type Draw, drawTemplate } from '@/lib/templates/draw';
import { parseTemplate } from '@/lib/templates/parse';
import type { Template } from '@/lib/templates/plan';
import type { Problem } from '@/lib/templates/problem';

/** A small library for texts written in tests. */
export const library: Library = {
  areas: {
    motors: { area: 'motors', title: 'Motors', order: 1, caution: 'none' },
    live: { area: 'live', title: 'Live work', order: 2, caution: 'required' },
  },
  cautions: { hot: { caution: 'hot', title: 'Hot parts', text: 'It is *hot*.' } },
  tables: {
    shop: {
      table: 'shop', title: 'Motors of the shop',
      columns: { P: { unit: 'kW' }, V: { unit: 'V', label: 'Voltage' }, Ra: { unit: 'ohm', decimals: 2 }, wound: {} },
      rows: [[2.2, 240, 1.5, 'lap'], [5.5, 240, 0.6, 'wave'], [11, 500, 0.9, 'wave'], [75, 500, 0.05, 'lap']],
    },
  },
};

/**
 * One shunt motor with one value to each given, so that every key is worked by hand: field current 230/230 = 1 A,
 * armature current 50 - 1 = 49 A, back-EMF 230 - 49 x 0.4 = 210.4 V, power 210.4 x 49 = 10 309.6 W.
 */
export const fixedMotor = `template: fixed-motor
language: 1
title: A motor with fixed values
area: motors
level: 1
minutes: 5
given:
  V: { label: Supply voltage, unit: V, choose: [230] }
  Ra: { label: Armature circuit, symbol: R_a, unit: ohm, choose: [0.4] }
  IL: { label: Line current, symbol: I_L, unit: A, choose: [50] }
  Rf: { label: Field circuit, symbol: R_f, unit: ohm, choose: [230] }
stem: |
  A motor takes {{IL}} from {{V}}.
parts:
  - part: a
    kind: number
    ask: Find the armature current.
    key: IL - V / Rf
    unit: A
    marks: 1
    accept: { within: 0.5 percent, or: 0.1 A }
    missteps:
      - { key: IL + V / Rf, says: field current added }
  - part: b
    kind: number
    ask: Find the back-EMF.
    key: V - part.a * Ra
    unit: V
    marks: 2
    figures: 4
    missteps:
      - { key: V + part.a * Ra, says: the drop is added, earns: 1 }
  - part: c
    kind: number
    ask: Find the power made.
    key: part.a * part.b
    unit: W
    marks: 3
    working: true
    limits: [0, 11500]
solution: |
  $I_a = {{part.a}}$, $E = {{part.b}}$, so {{part.c}}.
`;

export const problemsOf = (text: string): Problem[] => {
  const parsed = parseTemplate(text, library);
  return parsed.ok ? [] : parsed.problems;
};

/** The template of a text that is in order; throws with its problems where it is not. */
export function templateOf(text: string): Template {
  const parsed = parseTemplate(text, library);
  if (!parsed.ok) throw new Error(parsed.problems.map(({ code, line, says }) => `${line ?? 0} ${code} ${says}`).join('\n'));
  return parsed.template;
}

export function drawOf(template: Template, seed = 'seed', locale = 'en'): Draw {
  const drawn = drawTemplate(template, seed, { locale });
  if (!drawn.ok) throw new Error(drawn.says);
  return drawn.value;
}
