import type { ReactNode } from 'react';
import type { ConfirmQuestion } from '../Confirm';

export type CellValue = string | number | null;
/** A bare value, or `value` (sorted, filtered, saved) with `show` (printed in its place). */
export type LedgerCell = CellValue | { value: CellValue; show: ReactNode };

export type LedgerColumn = {
  key: string;
  title: string;
  /** A column of numerals, right-aligned on the decimal; a number fixes its decimals. */
  figures?: true | number;
  /** The ledger's double hairline at the left of this column: words on one side, figures on the other. */
  rule?: boolean;
  /** A list above the ledger to choose one of this column's values. */
  choose?: boolean;
  /** Not shown until chosen under Columns. */
  hidden?: boolean;
};

/** `href`: where Enter on the row leads. `gone`: set back, in soft ink (retired, absent). `cells` by column key. */
export type LedgerRow = { id: string; href?: string; gone?: boolean; cells: Record<string, LedgerCell> };

export type BulkOutcome = { ok: boolean; says?: string } | void;
/** An action over the selected rows, by id; `run` may be a server action. With `confirm` it asks first. */
export type BulkAction = {
  label: string;
  look?: 'plain' | 'stop';
  confirm?: ConfirmQuestion;
  run: (ids: string[]) => Promise<BulkOutcome> | BulkOutcome;
};

export type LedgerOptions = {
  /** What a row is, for counts: `{ one: 'template', many: 'templates' }`. */
  noun?: { one: string; many: string };
  /** Said in the filter box ("Find a title, given or caution"). */
  find?: string;
  /** The CSV's name without its ending. */
  file?: string;
  /** The totals row, by column key. */
  total?: Record<string, LedgerCell>;
  /** Rows a page; past 200 unless said. */
  pageSize?: number;
  /** Column key, and whether descending at first. */
  sort?: { key: string; descending?: boolean };
  /** 56 px rows, for two lines. */
  tall?: boolean;
  /** Without filter and columns, for a short table on a page of other things. */
  bare?: boolean;
};

export const valueOf = (cell: LedgerCell | undefined): CellValue =>
  cell === undefined || cell === null ? null : typeof cell === 'object' ? cell.value : cell;

const folded = (text: string): string => text.normalize('NFD').replace(/\p{M}/gu, '').toLowerCase();

/** Whether each word of `wanted` stands somewhere in the row, whatever its case and accents. */
export function rowMatches(row: LedgerRow, wanted: string): boolean {
  const text = folded(Object.values(row.cells).map((cell) => String(valueOf(cell) ?? '')).join(' \u0000 '));
  return folded(wanted).split(/\s+/).every((word) => text.includes(word));
}

/** Numbers by size, words by the alphabet with numbers inside them by size. */
export function compareValues(a: CellValue, b: CellValue): number {
  if (typeof a === 'number' && typeof b === 'number') return a - b;
  return String(a ?? '').localeCompare(String(b ?? ''), undefined, { numeric: true, sensitivity: 'base' });
}

const decimalsOf = (value: CellValue): number => (typeof value === 'number' ? (String(value).split('.')[1]?.length ?? 0) : 0);

/** Decimals that a column of numerals keeps room for, so that its points stand under each other. */
export function columnDecimals(column: LedgerColumn, rows: readonly LedgerRow[]): number {
  if (typeof column.figures === 'number') return column.figures;
  return rows.reduce((most, row) => Math.max(most, decimalsOf(valueOf(row.cells[column.key]))), 0);
}
