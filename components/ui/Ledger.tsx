'use client';

import type { ReactNode } from 'react';
import { Button } from './Button';
import { Bulk } from './ledger/Bulk';
import type { BulkAction, LedgerColumn, LedgerOptions, LedgerRow } from './ledger/model';
import { Table } from './ledger/Table';
import { Tools } from './ledger/Tools';
import { useLedger, type LedgerTable } from './ledger/use-ledger';

type LedgerProps = {
  /** What the table holds, for a screen reader. */
  label: string;
  columns: readonly LedgerColumn[];
  rows: readonly LedgerRow[];
  /** An EmptyState that says what to do next. */
  empty: ReactNode;
  bulk?: readonly BulkAction[];
  options?: LedgerOptions;
};

function Pages({ table, found }: { table: LedgerTable; found: number }) {
  const { pageIndex, pageSize } = table.state.pagination;
  const from = pageIndex * pageSize + 1;
  const to = Math.min(found, from + pageSize - 1);
  return (
    <div className="ledger-foot">
      <span>
        {from} to {to} of {found}
      </span>
      <div className="btn-row">
        <Button size="dense" disabled={!table.getCanPreviousPage()} onClick={() => table.previousPage()}>
          Earlier
        </Button>
        <Button size="dense" disabled={!table.getCanNextPage()} onClick={() => table.nextPage()}>
          Next {Math.min(pageSize, Math.max(0, found - to)) || ''}
        </Button>
      </div>
    </div>
  );
}

const none: LedgerOptions = {};

/**
 * The one table. Columns and rows are plain data (cells may carry `show`, a node, beside their `value`), so a
 * server component can hand them over; the first column names the row and is its link. Keyboard: arrows move,
 * Enter opens, Space selects, / goes to the filter. Keep `columns` and `rows` stable between renders.
 */
export function Ledger({ label, columns, rows, empty, bulk, options = none }: LedgerProps) {
  const table = useLedger(columns, rows, options);
  if (rows.length === 0) return empty;
  const found = table.getFilteredRowModel().rows.length;
  const { pageIndex, pageSize } = table.state.pagination;
  // Rows can go while a later page is open (a live list, a narrower filter).
  if (pageIndex > 0 && pageIndex * pageSize >= found) table.setPageIndex(0);
  const pick = bulk !== undefined && bulk.length > 0;
  const clear = () => {
    table.setGlobalFilter('');
    table.resetColumnFilters(true);
  };
  return (
    <section aria-label={label}>
      {!options.bare && <Tools table={table} columns={columns} rows={rows} label={label} options={options} />}
      {pick && <Bulk table={table} actions={bulk} />}
      {found === 0 ? (
        <div className="empty">
          <h3>Nothing fits the filter</h3>
          <p>Write less of the word, or show all.</p>
          <div className="btn-row">
            <Button onClick={clear}>Show all {rows.length}</Button>
          </div>
        </div>
      ) : (
        <Table table={table} columns={columns} rows={rows} label={label} options={options} pick={pick} />
      )}
      {found > pageSize && <Pages table={table} found={found} />}
    </section>
  );
}
