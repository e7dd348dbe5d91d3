'use client';

import { useEffect, useRef, type RefObject } from 'react';
import { Button } from '../Button';
import { SelectBox } from '../Select';
import { ledgerCsv, saveText } from './csv';
import { compareValues, valueOf, type LedgerColumn, type LedgerOptions, type LedgerRow } from './model';
import type { LedgerTable } from './use-ledger';

type ToolsProps = { table: LedgerTable; columns: readonly LedgerColumn[]; rows: readonly LedgerRow[]; label: string; options: LedgerOptions };

const editable = (target: EventTarget | null): boolean =>
  target instanceof HTMLElement && (target.isContentEditable || ['INPUT', 'TEXTAREA', 'SELECT'].includes(target.tagName));

/** `/` leads to the filter from anywhere on the page, unless single-key shortcuts are switched off in the account menu. */
function useSlash(box: RefObject<HTMLInputElement | null>) {
  useEffect(() => {
    const onKey = (event: KeyboardEvent) => {
      if (event.key !== '/' || event.ctrlKey || event.metaKey || event.altKey || event.defaultPrevented) return;
      if (editable(event.target) || document.documentElement.dataset.keys === 'off' || document.querySelector('dialog[open]')) return;
      event.preventDefault();
      box.current?.focus();
    };
    document.addEventListener('keydown', onKey);
    return () => document.removeEventListener('keydown', onKey);
  }, [box]);
}

function Find({ table, label, hint }: { table: LedgerTable; label: string; hint: string }) {
  const box = useRef<HTMLInputElement>(null);
  useSlash(box);
  return (
    <div className="find">
      <input
        ref={box}
        type="search"
        className="input"
        placeholder={hint}
        aria-label={`Filter ${label}`}
        aria-keyshortcuts="/"
        value={String(table.state.globalFilter ?? '')}
        onChange={(event) => {
          table.setGlobalFilter(event.target.value);
          table.setPageIndex(0);
        }}
      />
      <kbd className="kbd" aria-hidden="true">
        /
      </kbd>
    </div>
  );
}

function Choose({ table, column, rows }: { table: LedgerTable; column: LedgerColumn; rows: readonly LedgerRow[] }) {
  const values = [...new Set(rows.map((row) => valueOf(row.cells[column.key])).filter((value) => value !== null))].sort(compareValues);
  const held = table.getColumn(column.key);
  return (
    <SelectBox
      aria-label={column.title}
      value={String(held?.getFilterValue() ?? '')}
      onChange={(event) => {
        held?.setFilterValue(event.target.value || undefined);
        table.setPageIndex(0);
      }}
      options={[{ value: '', label: `${column.title}: all` }, ...values.map((value) => ({ value: String(value), label: `${column.title}: ${value}` }))]}
    />
  );
}

function Columns({ table, columns }: { table: LedgerTable; columns: readonly LedgerColumn[] }) {
  return (
    <details className="ledger-columns">
      <summary className="btn btn--quiet">Columns</summary>
      <div role="group" aria-label="Columns shown">
        {columns.slice(1).map((column) => (
          <label className="check" key={column.key}>
            <input
              type="checkbox"
              className="tick"
              checked={table.getColumn(column.key)?.getIsVisible() ?? true}
              onChange={(event) => table.getColumn(column.key)?.toggleVisibility(event.target.checked)}
            />
            <span>{column.title}</span>
          </label>
        ))}
      </div>
    </details>
  );
}

/** Filter, lists to choose from, count, columns and CSV above a ledger. */
export function Tools({ table, columns, rows, label, options }: ToolsProps) {
  const found = table.getFilteredRowModel().rows.length;
  const noun = options.noun ?? { one: 'row', many: 'rows' };
  const said = `${found === rows.length ? '' : `${found} of `}${rows.length} ${rows.length === 1 ? noun.one : noun.many}`;
  const save = () => {
    const shown = columns.filter((column) => table.getColumn(column.key)?.getIsVisible());
    const ordered = table.getPrePaginatedRowModel().rows.map((row) => row.original);
    saveText(`${options.file ?? label.toLowerCase().replace(/\W+/g, '-')}.csv`, ledgerCsv(shown, ordered));
  };
  return (
    <div className="ledger-tools">
      <Find table={table} label={label} hint={options.find ?? 'Find'} />
      {columns.filter((column) => column.choose).map((column) => (
        <Choose key={column.key} table={table} column={column} rows={rows} />
      ))}
      <span className="count" role="status">
        {said}
      </span>
      <Columns table={table} columns={columns} />
      <Button look="quiet" onClick={save}>
        Save as CSV
      </Button>
    </div>
  );
}
