import type { z } from 'zod';
import type { Expression, Value } from '@/lib/expressions/compile';
import type { Unit } from '@/lib/numeric/units';
import type { Notation } from '@/lib/numeric/notation';
import type { MarkingPolicy } from '@/lib/marking/policy';
import type { Path } from '../yaml';
import type { ProblemCode } from '../problem';
import type { Amount } from '../tolerance';

/** What expressions are evaluated over: givens and derived values by name, earlier parts by their id. */
export interface Scope { values: Record<string, Value>; parts: Record<string, Value> }

export interface DrawnOption {
  option: string;
  text: string;
  right: boolean;
  /** place of the option in the template: for a list its row, for computed ones 0 the key and n the n-th misstep */
  source: number;
  value?: Amount;
  says?: string;
  earns?: number;
}
export interface DrawnMisstep { value: Amount | null; text: string; says: string; earns: number; separatedBy?: string }

/** One part of a draw, as plain data that is stored whole and marked from later. */
export interface DrawnPart {
  part: string;
  kind: string;
  marks: number;
  key: { value: Amount | string; text: string };
  /** what `part.<id>` stands for in later expressions, where it stands for anything */
  carries?: Amount;
  unit?: string;
  accept: { tolerance: number; angle?: number };
  options?: DrawnOption[];
  missteps: DrawnMisstep[];
}

/** What drawing a part may use beside the values: streams of its own and the way to print. */
export interface Drawing {
  scope: Scope;
  notation: Notation;
  /** a stream of random numbers in [0, 1) of this draw, by name */
  stream(name: string): () => number;
  /** text with its placeholders filled from this draw */
  fill(text: string): string;
}

/** What a check learns from one draw of a part. */
export interface Sight { seed: string; scope: Scope; drawn: DrawnPart }
/** Tells the check what was found: `says` is written for the author. */
export type Note = (code: ProblemCode, says: string) => void;

export type Verdict = 'correct' | 'carried' | 'misstep' | 'wrong' | 'blank' | 'unread' | 'for-marker';

export interface PartMarking {
  part: string;
  awarded: number;
  of: number;
  verdict: Verdict;
  /** which rule awarded the marks, for the record */
  rule: string;
  reads?: { value: Amount | string; unit: string; text: string };
  key: { value: Amount | string; text: string };
  says: string;
  carriedFrom?: string[];
  unitSlip?: boolean;
  flagged?: boolean;
}

/** An answer to mark, with what earlier parts of the same question came to. */
export interface Marking {
  drawn: DrawnPart;
  answer: string;
  working: string;
  scope: Scope;
  /** scopes with the candidate's own earlier values in place of the true ones; empty where nothing earlier was answered */
  own: Scope[];
  /** earlier parts that were not right */
  slipped: ReadonlySet<string>;
  /** earlier parts whose own value is absurd */
  absurd: ReadonlySet<string>;
  /** whether a unit mistake has already cost a mark in this question */
  unitCharged: boolean;
  policy: MarkingPolicy;
  notation: Notation;
}
/** A marking, and the values that later parts may carry on from (the first as read; a second where a unit slip was put right). */
export interface Marked { marking: PartMarking; carries: Amount[]; absurd?: boolean; chargesUnit?: boolean }

export interface SeenOption { option: string; html: string }
/** What a candidate may see of a part beside its question and marks. */
export interface SeenPart { figures?: number; decimals?: number; unit?: string; ratio?: boolean; form?: 'real' | 'complex'; options?: SeenOption[] }

/** Evaluates a part again from values rounded as an honest candidate would round them. */
export type Rounded = (figures: number) => Scope;

/** Gathers what the check of one part needs over many draws. */
export interface Examiner {
  /** looks at one draw; `note` counts a problem for this draw */
  look(sight: Sight, rounded: Rounded, note: Note): void;
  /** problems that only show over all draws, as code, text and share of the draws (0 to 1) */
  finish(): { code: ProblemCode; says: string; count: number; share: number; seeds: string[] }[];
}

/** A part made ready: everything the engine asks of a kind, whatever the kind. */
export interface PartPlan {
  readonly part: string;
  readonly kind: string;
  readonly ask: string;
  readonly marks: number;
  readonly working: boolean;
  readonly unit: Unit | null;
  /** earlier parts that the key uses */
  readonly uses: readonly string[];
  /** value of `part.<id>` for later expressions; undefined where the kind has none */
  value(scope: Scope): Value | undefined;
  /** value used by an honest candidate who rounds to so many significant figures */
  roundedValue(scope: Scope, figures: number): Value | undefined;
  draw(drawing: Drawing): DrawnPart;
  /** prints the part's value with its own figures and unit */
  print(amount: Amount, notation: Notation): { text: string; tex: string };
  see(drawn: DrawnPart, render: (text: string, isTemplateText: boolean) => string): SeenPart;
  examiner(): Examiner;
  mark(marking: Marking): Marked;
  /** whether an example's published answer agrees, within a share of the published figure; a text says how it does not */
  agrees(scope: Scope, published: string, within: number): true | string;
}

/** What a kind may ask while a part is made ready; each complaint carries its place in the template. */
export interface Build {
  /** compiles an expression over givens, derived values and earlier parts; null after a complaint */
  expression(source: string, path: Path): Expression | null;
  /** complains where an expression's dimension is not that of the unit */
  dimension(expression: Expression, unit: Unit, path: Path, tradeConstant: boolean): void;
  unit(code: string, path: Path): Unit | null;
  /** reads "0.1 A" as an amount in a unit; null after a complaint */
  amount(text: string, unit: Unit, path: Path): number | null;
  /** checks length and placeholders of a printed text; `open` texts are seen before the answer */
  text(text: string, path: Path, limit: number): void;
  earlier(part: string): boolean;
  complain(code: ProblemCode, says: string, path: Path): void;
}

/** One kind of part: how it is written and how it is made ready. */
export interface Kind<Schema extends z.ZodType> {
  kind: string;
  schema: Schema;
  build(text: z.output<Schema>, build: Build): PartPlan | null;
}
