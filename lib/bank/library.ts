import { createHash } from 'node:crypto';
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import path from 'node:path';
import { parse as parseCsv } from 'csv-parse/sync';
import { parse as parseYaml } from 'yaml';
import { z } from 'zod';
import type { Library, Table } from '@/lib/templates/library';

const areasFile = z.strictObject({
  areas: z.array(z.strictObject({ area: z.string(), title: z.string(), order: z.number().default(0), caution: z.enum(['required', 'none']) })),
});
const cautionsFile = z.strictObject({
  cautions: z.array(z.strictObject({ caution: z.string(), title: z.string(), text: z.string() })),
});
const column = z.strictObject({
  unit: z.string().optional(), label: z.string().optional(), symbol: z.string().optional(), decimals: z.int().min(0).max(6).optional(),
});
const tableFile = z.strictObject({
  table: z.string(),
  title: z.string(),
  note: z.string().optional(),
  columns: z.record(z.string().regex(/^[A-Za-z][A-Za-z0-9_]*$/), column),
  rows: z.array(z.array(z.union([z.number(), z.string()]))).min(1),
}).refine((table) => table.rows.every((row) => row.length === Object.keys(table.columns).length), 'each row needs one value a column');

const yamlIn = (file: string): unknown => parseYaml(readFileSync(file, 'utf8'), { maxAliasCount: 0 });
const numberOrText = (cell: string): number | string => (cell.trim() !== '' && Number.isFinite(Number(cell)) ? Number(cell) : cell.trim());

/** A table as CSV: its first row names the columns, each as `name` or `name [unit]`; lines that begin with # are notes. */
const csvTable = (file: string): Table => {
  const text = readFileSync(file, 'utf8');
  const name = path.basename(file, '.csv');
  const [head = [], ...rows] = parseCsv(text, { comment: '#', comment_no_infix: true, trim: true, skip_empty_lines: true }) as string[][];
  const columns = Object.fromEntries(head.map((cell) => {
    const [, id = cell, unit] = /^([^[\s]+)\s*(?:\[([^\]]+)\])?$/.exec(cell) ?? [];
    return [id, unit === undefined ? {} : { unit }];
  }));
  return tableFile.parse({ table: name, title: name, columns, rows: rows.map((row) => row.map(numberOrText)) });
};

const readTable = (file: string): Table => (file.endsWith('.csv') ? csvTable(file) : tableFile.parse(yamlIn(file)));

const tableFiles = (folder: string): string[] => {
  const tables = path.join(folder, 'tables');
  if (!existsSync(tables)) return [];
  return readdirSync(tables).filter((file) => /\.(ya?ml|csv)$/.test(file)).sort().map((file) => path.join(tables, file));
};

const byName = <Row>(rows: readonly Row[], name: (row: Row) => string): Record<string, Row> =>
  Object.fromEntries(rows.map((row) => [name(row), row]));

/** The folder of templates of this installation. */
export const templatesFolder = (): string => path.join(process.cwd(), 'question-templates');

/**
 * Loads areas, cautions and tables of machines. Throws where a file is missing or not in form: the library is part of
 * the program, not something a person typed.
 */
export function loadLibrary(folder: string = templatesFolder()): Library {
  const { areas } = areasFile.parse(yamlIn(path.join(folder, 'areas.yaml')));
  const { cautions } = cautionsFile.parse(yamlIn(path.join(folder, 'cautions.yaml')));
  return {
    areas: byName(areas, (row) => row.area),
    cautions: byName(cautions, (row) => row.caution),
    tables: byName(tableFiles(folder).map(readTable), (table) => table.table),
  };
}

/** SHA-256 [hex] of each row or table that a template version may rest on, named `caution:x`, `table:x`, `area:x`. */
export function libraryDigests(library: Library): Record<string, string> {
  const digest = (value: unknown) => createHash('sha256').update(JSON.stringify(value)).digest('hex');
  const named = (kind: string, rows: Record<string, unknown>) => Object.entries(rows).map(([name, row]) => [`${kind}:${name}`, digest(row)]);
  return Object.fromEntries([...named('area', library.areas), ...named('caution', library.cautions), ...named('table', library.tables)]);
}
