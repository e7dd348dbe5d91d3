import type { Expression } from '@/lib/expressions/compile';
import type { Unit } from '@/lib/numeric/units';
import type { Complaints } from './complaints';
import type { GivenPlan } from './plan';
import type { Path } from './yaml';

/** What each name and part of a template measures, and whether a formula's dimension is that of its unit. */
export class Dimensions {
  private readonly units = new Map<string, Unit>();
  private readonly parts = new Map<string, Unit>();
  constructor(givens: readonly GivenPlan[], private readonly complaints: Complaints) {
    for (const { name, unit } of givens) this.units.set(name, unit);
  }

  know(name: string, unit: Unit): void {
    this.units.set(name, unit);
  }
  knowPart(part: string, unit: Unit): void {
    this.parts.set(part, unit);
  }
  infer(_name: string, _expression: Expression, _path: Path): void {
    return undefined;
  }
  check(_expression: Expression, _target: Unit, _path: Path, _tradeConstant: boolean): void {
    return undefined;
  }
}
