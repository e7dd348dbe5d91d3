'use client';

import Link from 'next/link';
import type { KeyboardEvent } from 'react';
import { Shape } from '../Shape';
import { cellClass, cellText } from './Cell';
import { columnDecimals, valueOf, type LedgerColumn, type LedgerOptions, type LedgerRow } from './model';
import type { LedgerTable } from './use-ledger';

type TableProps = { table: LedgerTable; columns: readonly LedgerColumn[]; rows: readonly LedgerRow[]; label: string; options: LedgerOptions; pick: boolean };

/** Arrows move among rows, Home and End to the ends, Space selects; Enter follows the row's link by itself. */
function onKeys(event: KeyboardEvent<HTMLElement>, toggle: (id: string) => void) {
  const target = event.target as HTMLElement;
  if (target.matches('input:not([type=checkbox]), select, textarea') || event.ctrlKey || event.metaKey || event.altKey) return;
  const lines = [...event.currentTarget.querySelectorAll<HTMLElement>('[data-line]')];
  const line = target.closest('tr')?.querySelector<HTMLElement>('[data-line]') ?? target.closest<HTMLElement>('tr[data-line]');
  const at = line ? lines.indexOf(line) : -1;
  if (at < 0) return;
  const next = { ArrowDown: at + 1, ArrowUp: at - 1, Home: 0, End: lines.length - 1 }[event.key];
  if (next !== undefined) {
    event.preventDefault();
    lines[Math.max(0, Math.min(lines.length - 1, next))]?.focus();
  } else if (event.key === ' ' && line && target === line) {
    event.preventDefault();
    toggle(line.dataset.line ?? '');
  }
}

function Head({ table, columns, pick }: Pick<TableProps, 'table' | 'columns' | 'pick'>) {
  return (
    <thead role="rowgroup">
      <tr role="row">
        {pick && (
          <th className="pick" role="columnheader" scope="col">
            <label>
              <input
                type="checkbox"
                className="tick"
                aria-label="Select all rows of this page"
                checked={table.getIsAllPageRowsSelected()}
                ref={(box) => {
                  if (box) box.indeterminate = table.getIsSomePageRowsSelected() && !table.getIsAllPageRowsSelected();
                }}
                onChange={(event) => table.toggleAllPageRowsSelected(event.target.checked)}
              />
            </label>
          </th>
        )}
        {columns.map((column) => {
          const held = table.getColumn(column.key);
          const sorted = held?.getIsSorted();
          return (
            <th
              key={column.key}
              role="columnheader"
              scope="col"
              className={cellClass(column)}
              aria-sort={sorted ? (sorted === 'desc' ? 'descending' : 'ascending') : undefined}
            >
              <button
                type="button"
                className="sort"
                onClick={() => {
                  held?.toggleSorting(sorted === 'asc');
                  table.setPageIndex(0);
                }}
              >
                {column.title}
                {sorted && <Shape name="arrow" />}
              </button>
            </th>
          );
        })}
      </tr>
    </thead>
  );
}

type LineProps = { row: ReturnType<LedgerTable['getRowModel']>['rows'][number]; columns: readonly LedgerColumn[]; room: ReadonlyMap<string, number>; pick: boolean; first: boolean };

function Line({ row, columns, room, pick, first }: LineProps) {
  const { original } = row;
  const selected = row.getIsSelected();
  const look = [original.gone ? 'is-gone' : '', selected ? 'is-selected' : ''].filter(Boolean).join(' ');
  const line = original.href ? {} : { 'data-line': row.id, tabIndex: first ? 0 : -1 };
  return (
    <tr role="row" className={look || undefined} {...line}>
      {pick && (
        <td className="pick" role="cell">
          <label>
            <input
              type="checkbox"
              className="tick"
              aria-label={`Select ${String(valueOf(original.cells[columns[0]?.key ?? '']) ?? row.id)}`}
              checked={selected}
              onChange={row.getToggleSelectedHandler()}
            />
          </label>
        </td>
      )}
      {columns.map((column, place) => {
        const text = cellText(original.cells[column.key], column, room.get(column.key) ?? 0);
        if (place > 0) {
          return (
            <td key={column.key} role="cell" className={cellClass(column)} data-head={column.title}>
              {text}
            </td>
          );
        }
        return (
          <th key={column.key} role="rowheader" scope="row" className={cellClass(column)}>
            {original.href ? (
              <Link className="opener" href={original.href} data-line={row.id}>
                {text}
              </Link>
            ) : (
              text
            )}
          </th>
        );
      })}
    </tr>
  );
}

/** The ruled table itself; stacked into cards on a narrow screen, so roles are said where display would lose them. */
export function Table({ table, columns, rows, label, options, pick }: TableProps) {
  const shown = columns.filter((column) => table.getColumn(column.key)?.getIsVisible());
  const room = new Map(columns.filter((column) => column.figures !== undefined).map((column) => [column.key, columnDecimals(column, rows)]));
  const toggle = (id: string) => {
    if (pick) table.getRow(id).toggleSelected();
  };
  return (
    <div className="ledger-scroll">
      <table className={`ledger${options.tall ? ' ledger--tall' : ''}`} role="table" aria-label={label}>
        <Head table={table} columns={shown} pick={pick} />
        <tbody role="rowgroup" onKeyDown={(event) => onKeys(event, toggle)}>
          {table.getRowModel().rows.map((row, place) => (
            <Line key={row.id} row={row} columns={shown} room={room} pick={pick} first={place === 0} />
          ))}
        </tbody>
        {options.total && (
          <tfoot role="rowgroup">
            <tr role="row">
              {pick && <td className="pick" role="cell" />}
              {shown.map((column, place) => {
                const text = cellText(options.total?.[column.key] ?? '', { ...column, figures: options.total?.[column.key] === undefined ? undefined : column.figures }, room.get(column.key) ?? 0);
                return place === 0 ? (
                  <th key={column.key} role="rowheader" scope="row">
                    {text}
                  </th>
                ) : (
                  <td key={column.key} role="cell" className={cellClass(column)} data-head={text === '' ? undefined : column.title}>
                    {text}
                  </td>
                );
              })}
            </tr>
          </tfoot>
        )}
      </table>
    </div>
  );
}
