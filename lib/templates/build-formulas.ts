import { compile, type Expression } from '@/lib/expressions/compile';
import { RESERVED } from '@/lib/expressions/functions';
import type { Unit } from '@/lib/numeric/units';
import { unitNamed } from './build-givens';
import type { Complaints } from './complaints';
import { Dimensions } from './build-dimensions';
import type { DerivedPlan, GivenPlan, RequirementPlan } from './plan';
import type { TemplateText } from './parse';
import type { Path } from './yaml';

/** Compiles the expressions of one template and knows which names each may use. */
export class Formulas {
  readonly dimensions: Dimensions;
  private readonly names: Set<string>;

  constructor(readonly text: TemplateText, givens: readonly GivenPlan[], readonly complaints: Complaints) {
    this.dimensions = new Dimensions(givens, complaints);
    this.names = new Set(Object.keys(text.given));
    for (const name of [...Object.keys(text.given), ...Object.keys(text.derive)])
      if (RESERVED.has(name)) complaints.add('name', `${name} has a meaning of its own in expressions: choose another name.`, [Object.hasOwn(text.given, name) ? 'given' : 'derive', name]);
  }

  /** Compiles over the names known so far and the given earlier parts; null after a complaint with its place. */
  compile(source: string, path: Path, parts: ReadonlySet<string> = new Set()): Expression | null {
    const compiled = compile(source, { values: this.names, parts });
    if (compiled.ok) return compiled.value;
    this.complaints.add(compiled.code, compiled.says, path, compiled.at);
    return null;
  }

  unit(code: string, path: Path): Unit | null {
    return unitNamed(code, path, this.complaints);
  }

  /** Derived values in their order: each may use givens and those before it. */
  buildDerived(): DerivedPlan[] {
    return Object.entries(this.text.derive).flatMap(([name, derived]): DerivedPlan[] => {
      const plan = typeof derived === 'string' ? this.undeclared(name, derived) : this.declared(name, derived);
      this.names.add(name);
      return plan === null ? [] : [plan];
    });
  }

  private undeclared(name: string, source: string): DerivedPlan | null {
    const expression = this.compile(source, ['derive', name]);
    if (expression === null) return null;
    this.dimensions.infer(name, expression, ['derive', name]);
    return { name, expression, declared: null };
  }

  private declared(name: string, derived: Exclude<TemplateText['derive'][string], string>): DerivedPlan | null {
    const expression = this.compile(derived.key, ['derive', name, 'key']);
    const unit = this.unit(derived.unit, ['derive', name, 'unit']);
    if (unit === null) return null;
    this.dimensions.know(name, unit);
    if (expression === null) return null;
    this.dimensions.check(expression, unit, ['derive', name, 'key'], derived['trade-constant'] !== undefined);
    const precision = derived.decimals === undefined ? { figures: derived.figures ?? 3 } : { decimals: derived.decimals };
    return { name, expression, declared: { unit, precision, label: derived.label, symbol: derived.symbol } };
  }

  buildRequirements(): RequirementPlan[] {
    return this.text.require.flatMap((source, index) => {
      const expression = this.compile(source, ['require', index]);
      return expression === null ? [] : [{ source, expression }];
    });
  }
}
