import {
  columnFilteringFeature,
  columnVisibilityFeature,
  createColumnHelper,
  createFilteredRowModel,
  createPaginatedRowModel,
  createSortedRowModel,
  globalFilteringFeature,
  rowPaginationFeature,
  rowSelectionFeature,
  rowSortingFeature,
  tableFeatures,
  useTable,
} from '@tanstack/react-table';
import { useMemo } from 'react';
import { compareValues, rowMatches, valueOf, type LedgerColumn, type LedgerOptions, type LedgerRow } from './model';

const features = tableFeatures({
  columnFilteringFeature,
  columnVisibilityFeature,
  globalFilteringFeature,
  rowPaginationFeature,
  rowSelectionFeature,
  rowSortingFeature,
  filteredRowModel: createFilteredRowModel(),
  sortedRowModel: createSortedRowModel(),
  paginatedRowModel: createPaginatedRowModel(),
});
const helper = createColumnHelper<typeof features, LedgerRow>();

export const rowsAtOnce = 200;

export function useLedger(columns: readonly LedgerColumn[], rows: readonly LedgerRow[], options: LedgerOptions) {
  const definitions = useMemo(
    () =>
      helper.columns(
        columns.map((column) =>
          helper.accessor((row) => valueOf(row.cells[column.key]) ?? undefined, {
            id: column.key,
            header: column.title,
            sortUndefined: 'last',
            sortFn: (a, b) => compareValues(valueOf(a.original.cells[column.key]), valueOf(b.original.cells[column.key])),
            filterFn: (row, _id, wanted: string) => String(valueOf(row.original.cells[column.key]) ?? '') === wanted,
          }),
        ),
      ),
    [columns],
  );
  const data = useMemo(() => [...rows], [rows]);
  const first = columns[0]?.key;
  return useTable({
    features,
    columns: definitions,
    data,
    getRowId: (row) => row.id,
    autoResetPageIndex: false,
    enableSortingRemoval: false,
    globalFilterFn: (row, _id, wanted: string) => rowMatches(row.original, wanted),
    // The match reads the whole row, so one column asks for all.
    getColumnCanGlobalFilter: (column) => column.id === first,
    initialState: {
      pagination: { pageIndex: 0, pageSize: options.pageSize ?? rowsAtOnce },
      sorting: options.sort ? [{ id: options.sort.key, desc: options.sort.descending ?? false }] : [],
      columnVisibility: Object.fromEntries(columns.filter((column) => column.hidden).map((column) => [column.key, false])),
    },
  });
}

export type LedgerTable = ReturnType<typeof useLedger>;
