import { compile, type Value } from '@/lib/expressions/compile';
import { domainOf, type DomainValue } from '@/lib/numeric/domain';
import { findUnit, type Unit } from '@/lib/numeric/units';
import type { Complaints } from './complaints';
import type { Library, Table } from './library';
import { type GivenText, longest } from './model';
import type { Choices, GivenPlan, TablePlan, TemplateHead } from './plan';
import type { Path } from './yaml';

/** A unit by its code, or a complaint that names the code. */
export function unitNamed(code: string, path: Path, complaints: Complaints): Unit | null {
  const unit = findUnit(code);
  if (unit === null) complaints.add('schema', `"${code}" is not a known unit; a pure number is "unit: none".`, path);
  return unit;
}

/** Values are exact decimals, costly to make: each is made once and kept. */
const kept = (choices: { count: number; at(place: number): DomainValue }): Choices => {
  const made: DomainValue[] = [];
  return { count: choices.count, at: (place) => (made[place] ??= choices.at(place)) };
};

const waysOf = ({ choose, column, range, step, series }: GivenText): string[] => [
  ...(choose === undefined ? [] : ['choose']), ...(column === undefined ? [] : ['column']),
  ...(range !== undefined || step !== undefined || series !== undefined ? ['range'] : []),
];

const choicesOf = (given: GivenText, path: Path, complaints: Complaints): Choices | null => {
  const { choose, range, step, series, decimals } = given;
  if (range !== undefined && (step === undefined) === (series === undefined)) {
    complaints.add('schema', 'A range needs a step or a series, one of them.', path);
    return null;
  }
  if (choose === undefined && range === undefined) {
    complaints.add('schema', 'A series or step needs a range: [low, high].', path);
    return null;
  }
  if (choose !== undefined && new Set(choose.map((value) => typeof value)).size > 1) {
    complaints.add('schema', 'Choose from numbers or from words, not from both.', [...path, 'choose']);
    return null;
  }
  const domain = domainOf(choose !== undefined ? { choose } : series !== undefined ? { series, range: range ?? [0, 0] } : { range: range ?? [0, 0], step: step ?? 0 });
  if (!domain.ok) {
    complaints.add('schema', domain.says, path);
    return null;
  }
  const { count, at } = domain.value;
  return kept(decimals === undefined ? { count, at } : { count, at: (place) => ({ ...at(place), decimals: Math.max(decimals, at(place).decimals) }) });
};

const symbolOf = (name: string, given: GivenText, fallback?: string): string => given.symbol ?? fallback ?? (name.length === 1 ? name : '');

const columnGiven = (name: string, given: GivenText, column: string, table: Table | null, complaints: Complaints): GivenPlan | null => {
  const path = ['given', name, 'column'];
  if (table === null) {
    complaints.add('schema', 'A column needs a table: write plate: { table: … }.', path);
    return null;
  }
  const names = Object.keys(table.columns);
  const index = names.indexOf(column);
  const described = index < 0 ? undefined : table.columns[column];
  if (described === undefined) {
    complaints.add('schema', `Table ${table.table} has no column "${column}"; it has ${names.join(', ')}.`, path);
    return null;
  }
  const unit = unitNamed(given.unit ?? described.unit ?? 'none', ['given', name, 'unit'], complaints);
  if (unit === null) return null;
  const own = findUnit(described.unit ?? 'none');
  if (own !== null && own.code !== unit.code)
    complaints.add('schema', `Column "${column}" is in ${own.code}: state that unit or none.`, ['given', name, 'unit']);
  const decimals = given.decimals ?? described.decimals;
  return { name, label: given.label, symbol: symbolOf(name, given, described.symbol), unit, from: { column: index, ...(decimals === undefined ? {} : { decimals }) } };
};

/** Makes one given ready. */
export function buildGiven(name: string, given: GivenText, table: Table | null, complaints: Complaints): GivenPlan | null {
  const path = ['given', name];
  if (given.label.length > longest.label) complaints.add('length', `The label of ${name} is longer than ${longest.label} characters: shorten it.`, [...path, 'label']);
  const ways = waysOf(given);
  if (ways.length !== 1) {
    complaints.add('schema', `State one way to draw ${name}: choose, range with step or series, or column${ways.length > 1 ? ` (here: ${ways.join(' and ')})` : ''}.`, path);
    return null;
  }
  if (given.column !== undefined) return columnGiven(name, given, given.column, table, complaints);
  const words = given.choose?.every((value) => typeof value === 'string') === true;
  if (given.unit === undefined && !words) {
    complaints.add('schema', `${name} needs a unit; a pure number is "unit: none".`, path);
    return null;
  }
  const unit = unitNamed(given.unit ?? 'none', [...path, 'unit'], complaints);
  const choices = choicesOf(given, path, complaints);
  return unit === null || choices === null ? null : { name, label: given.label, symbol: symbolOf(name, given), unit, from: { choices } };
}

/**
 * The rows of the table that the plate may take. In `where` a name is a given read from a column, or else a column.
 */
export function buildTable(head: TemplateHead, library: Library, complaints: Complaints): { plan: TablePlan; table: Table } | null {
  const { plate } = head;
  if (plate === undefined) return null;
  const table = Object.hasOwn(library.tables, plate.table) ? library.tables[plate.table] : undefined;
  if (table === undefined) {
    complaints.add('schema', `There is no table "${plate.table}"; there are ${Object.keys(library.tables).join(', ') || 'none'}.`, ['plate', 'table']);
    return null;
  }
  const rows = plate.where === undefined ? table.rows : rowsWhere(plate.where, head, table, complaints);
  if (rows.length === 0) complaints.add('schema', `No row of table ${plate.table} fits "${plate.where ?? ''}".`, ['plate', 'where']);
  return { table, plan: { table: table.table, rows } };
}

function rowsWhere(where: string, head: TemplateHead, table: Table, complaints: Complaints): (number | string)[][] {
  const columns = Object.keys(table.columns);
  const readers = new Map(columns.map((column, index) => [column, index]));
  for (const [name, given] of Object.entries(head.given)) {
    const index = given.column === undefined ? -1 : columns.indexOf(given.column);
    if (index >= 0) readers.set(name, index);
  }
  const compiled = compile(where, { values: new Set(readers.keys()), parts: new Set() });
  if (!compiled.ok) {
    complaints.add('name', compiled.says, ['plate', 'where']);
    return table.rows;
  }
  return table.rows.filter((row) => {
    const values = Object.fromEntries([...readers].map(([name, index]): [string, Value] => [name, row[index] ?? NaN]));
    return compiled.value.evaluate({ values, parts: {} }) === true;
  });
}
