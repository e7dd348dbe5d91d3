import { describe, expect, it } from 'vitest';
import { loadLibrary } from '@/lib/bank/library';

const { tables } = loadLibrary();

/** Rows of a table as numbers by column. */
const machines = (name: string): Record<string, number>[] => {
  const table = tables[name];
  if (table === undefined) throw new Error(`no table ${name}`);
  const columns = Object.keys(table.columns);
  return table.rows.map((row) => Object.fromEntries(columns.map((column, index) => [column, Number(row[index])])));
};
const at = (machine: Record<string, number>, column: string): number => {
  const value = machine[column];
  if (value === undefined || !Number.isFinite(value)) throw new Error(`no ${column}`);
  return value;
};

/** Armature current [A], resistance of the armature circuit [ohm] and rated output [W] of a motor at its rated load. */
const ratedMotor: Record<string, (of: (column: string) => number) => { current: number; resistance: number; output: number }> = {
  'dc-shunt': (of) => ({ current: of('I') - of('V') / of('Rf'), resistance: of('Ra'), output: of('P') * 1000 }),
  'dc-series': (of) => ({ current: of('I'), resistance: of('Ra') + of('Rs'), output: of('P') * 746 }),
  'dc-compound': (of) => ({ current: of('I') - of('V') / of('Rf'), resistance: of('Ra') + of('Rs'), output: of('P') * 746 }),
  'dc-separate': (of) => ({ current: of('Ia'), resistance: of('Ra'), output: of('P') * 1000 }),
};

describe('tables of machines', () => {
  it.each(Object.keys(ratedMotor))('%s: power in, drops and losses of each row belong together', (name) => {
    for (const machine of machines(name)) {
      const of = (column: string) => at(machine, column);
      const { current, resistance, output } = ratedMotor[name]?.(of) ?? { current: NaN, resistance: NaN, output: NaN };
      const drop = (current * resistance) / of('V');
      const rotationalLoss = (of('V') - current * resistance) * current - output;
      expect(drop, JSON.stringify(machine)).toBeGreaterThan(0.025);
      expect(drop, JSON.stringify(machine)).toBeLessThan(0.12);
      expect(rotationalLoss / output, JSON.stringify(machine)).toBeGreaterThan(0.015);
      expect(rotationalLoss / output, JSON.stringify(machine)).toBeLessThan(0.14);
    }
  });

  it('dc-shunt: rotational loss and speed without load agree with those at rated load', () => {
    for (const machine of machines('dc-shunt')) {
      const of = (column: string) => at(machine, column);
      const field = of('V') / of('Rf');
      const [loaded, idle] = [of('I') - field, of('I0') - field];
      const [emf, idleEmf] = [of('V') - loaded * of('Ra'), of('V') - idle * of('Ra')];
      const [loss, idleLoss] = [emf * loaded - of('P') * 1000, idleEmf * idle];
      expect(Math.abs(idleLoss - loss) / loss, JSON.stringify(machine)).toBeLessThan(0.03);
      expect(Math.abs((of('n') * idleEmf) / emf - of('n0')), JSON.stringify(machine)).toBeLessThan(1);
    }
  });

  it('dc-generators: drops and field currents are those of common practice', () => {
    for (const machine of machines('dc-generators')) {
      const of = (column: string) => at(machine, column);
      const line = (of('P') * 1000) / of('V');
      const field = of('V') / of('Rf');
      expect(field / line, JSON.stringify(machine)).toBeGreaterThan(0.015);
      expect(field / line, JSON.stringify(machine)).toBeLessThan(0.05);
      expect(((line + field) * of('Ra')) / of('V'), JSON.stringify(machine)).toBeLessThan(0.1);
    }
  });

  it('dc-armatures: poles, winding, conductors, flux and speed make 125, 250 or 500 V within 10 %', () => {
    const table = tables['dc-armatures'];
    const wind = table === undefined ? -1 : Object.keys(table.columns).indexOf('wind');
    machines('dc-armatures').forEach((machine, row) => {
      const of = (column: string) => at(machine, column);
      const paths = table?.rows[row]?.[wind] === 'lap' ? of('p') : 2;
      const emf = (of('p') * of('phi') * 1e-3 * of('Z') * of('n')) / (60 * paths);
      expect([125, 250, 500].some((rated) => Math.abs(emf / rated - 1) < 0.1), JSON.stringify(machine)).toBe(true);
    });
  });
});
