import type { z } from 'zod';
import type { Expression } from '@/lib/expressions/compile';
import type { Unit } from '@/lib/numeric/units';
import type { PartPlan } from './kinds/kind';
import type { Area, Caution } from './library';
import type { templateHead } from './model';

declare const parsed: unique symbol;

/** What a template's text says, without its parts. */
export type TemplateHead = z.output<z.ZodObject<typeof templateHead>>;

/** Values that a given may take, by place from 0; each with the decimals it prints with. */
export interface Choices { count: number; at(index: number): { value: number | string; decimals: number } }

export interface GivenPlan {
  name: string;
  label: string;
  symbol: string;
  unit: Unit;
  /** drawn from choices of its own, or read from a column of the table row */
  from: { choices: Choices } | { column: number; decimals?: number };
}

/** A derived value; one that is printed is declared, and rounded before it is used. */
export interface DerivedPlan {
  name: string;
  expression: Expression;
  declared: { unit: Unit; precision: { figures: number } | { decimals: number }; label?: string; symbol?: string } | null;
}

export interface TablePlan { table: string; rows: readonly (readonly (number | string)[])[] }
export interface RequirementPlan { source: string; expression: Expression }

/** What is made ready once when a template is read, so that a draw only evaluates. */
export interface Plan {
  table: TablePlan | null;
  givens: readonly GivenPlan[];
  derived: readonly DerivedPlan[];
  requirements: readonly RequirementPlan[];
  parts: readonly PartPlan[];
}

/** A template that was read without a problem; only `parseTemplate` makes one. */
export interface Template {
  readonly [parsed]: true;
  readonly source: string;
  readonly head: TemplateHead;
  readonly area: Area;
  readonly cautions: readonly Caution[];
  readonly plan: Plan;
}

/** For `parseTemplate` alone: puts the brand on. */
export const brand = (template: Omit<Template, typeof parsed>): Template => template as Template;

export const marksOf = (template: Template): number => template.plan.parts.reduce((sum, part) => sum + part.marks, 0);
