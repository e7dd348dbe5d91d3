import type { Expression } from '@/lib/expressions/compile';
import { checkDimension, dimensionOf, type Quantity, type Units } from '@/lib/expressions/dimension';
import type { Unit } from '@/lib/numeric/units';
import type { Complaints } from './complaints';
import type { GivenPlan } from './plan';
import type { Path } from './yaml';

const unknown: Quantity = { dimension: null, factor: null };

/** What each name and part of a template measures, and whether a formula's dimension is that of its unit. */
export class Dimensions {
  private readonly names = new Map<string, Quantity>();
  private readonly parts = new Map<string, Quantity>();
  private readonly units: Units = {
    name: (name) => this.names.get(name) ?? unknown,
    part: (part) => this.parts.get(part) ?? unknown,
  };

  constructor(givens: readonly GivenPlan[], private readonly complaints: Complaints) {
    for (const { name, unit } of givens) this.names.set(name, unit);
  }

  know(name: string, unit: Unit): void {
    this.names.set(name, unit);
  }
  knowPart(part: string, unit: Unit): void {
    this.parts.set(part, unit);
  }

  /** Of a name that was complained of nothing is known: what uses it is not complained of again. */
  private isKnown({ names, parts }: Expression): boolean {
    return names.every((name) => this.names.has(name)) && parts.every((part) => this.parts.has(part));
  }

  /** Finds what a derived value measures that states no unit. */
  infer(name: string, expression: Expression, path: Path): void {
    if (!this.isKnown(expression)) return;
    const found = dimensionOf(expression, this.units);
    if (found.ok) this.names.set(name, found.value);
    else this.complaints.add('dimension', found.problem.says, path);
  }

  /**
   * Complains where a formula does not come out in its unit. A trade constant (5252, 0.0175) carries units of its own, so
   * beside one only what cannot be added or compared is a fault.
   */
  check(expression: Expression, target: Unit, path: Path, tradeConstant: boolean): void {
    if (!this.isKnown(expression)) return;
    if (!tradeConstant) {
      const problem = checkDimension(expression, this.units, target);
      if (problem !== null) this.complaints.add('dimension', problem.says, path);
      return;
    }
    const found = dimensionOf(expression, this.units);
    if (!found.ok && found.problem.problem === 'dimension') this.complaints.add('dimension', found.problem.says, path);
  }
}
