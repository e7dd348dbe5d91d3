import type { Expression } from '@/lib/expressions/compile';
import { readNumber } from '@/lib/numeric/reader';
import type { Unit } from '@/lib/numeric/units';
import type { Formulas } from './build-formulas';
import { checkText } from './build-texts';
import type { Complaints } from './complaints';
import type { Build, PartPlan } from './kinds/kind';
import type { ProblemCode } from './problem';
import type { Path } from './yaml';

/** What a kind may ask while the part at one place of the template is made ready; paths are within the part. */
export class PartBuild implements Build {
  private readonly carrying: ReadonlySet<string>;

  constructor(private readonly index: number, before: readonly PartPlan[], private readonly formulas: Formulas, private readonly complaints: Complaints) {
    // A part that could not be made ready is still named by later ones: one fault, one complaint.
    const written = formulas.text.parts.slice(0, index).filter((part) => part.kind !== 'choice' || part.options === 'computed');
    this.carrying = new Set(written.map(({ part }) => part));
    for (const { part, unit } of before) if (unit !== null) formulas.dimensions.knowPart(part, unit);
  }

  private at(path: Path): Path {
    return ['parts', this.index, ...path];
  }
  expression(source: string, path: Path): Expression | null {
    return this.formulas.compile(source, this.at(path), this.carrying);
  }
  dimension(expression: Expression, unit: Unit, path: Path, tradeConstant: boolean): void {
    this.formulas.dimensions.check(expression, unit, this.at(path), tradeConstant);
  }
  unit(code: string, path: Path): Unit | null {
    return this.formulas.unit(code, this.at(path));
  }
  amount(text: string, unit: Unit, path: Path): number | null {
    const reading = readNumber(text, { unit, notation: { decimal: '.' } });
    if (reading.ok && reading.value >= 0) return reading.value;
    this.complain('schema', reading.ok ? 'A tolerance is not below zero.' : `"${text}" is no amount in ${unit.code}: ${reading.says}`, path);
    return null;
  }
  text(text: string, path: Path, limit: number): void {
    checkText(text, limit, 'text', this.at(path), this.formulas.text, this.complaints);
  }
  earlier(part: string): boolean {
    return this.formulas.text.parts.slice(0, this.index).some((one) => one.part === part);
  }
  complain(code: ProblemCode, says: string, path: Path): void {
    this.complaints.add(code, says, this.at(path));
  }
}
