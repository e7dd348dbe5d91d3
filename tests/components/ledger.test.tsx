import { cleanup, render, screen, within } from '@testing-library/react';
import userEvent from '@testing-library/user-event';
import { afterEach, describe, expect, test } from 'vitest';
import { EmptyState } from '@/components/ui/EmptyState';
import { Ledger } from '@/components/ui/Ledger';
import { ledgerCsv } from '@/components/ui/ledger/csv';
import type { BulkAction, LedgerColumn, LedgerRow } from '@/components/ui/ledger/model';

afterEach(cleanup);

const columns: LedgerColumn[] = [
  { key: 'name', title: 'Candidate' },
  { key: 'total', title: 'Total', figures: true, rule: true },
  { key: 'outcome', title: 'Outcome', choose: true },
];
const rows: LedgerRow[] = [
  { id: 'a', href: '/a', cells: { name: 'Abara, Adaeze', total: 9.5, outcome: 'pass' } },
  { id: 'b', href: '/b', cells: { name: 'Dufresne, Gaëlle', total: 10, outcome: 'pass' } },
  { id: 'c', href: '/c', cells: { name: 'Kowal, Ulrike', total: null, outcome: 'absent' } },
];
const empty = <EmptyState title="No results yet" says="Close the sitting first." />;
const names = () => screen.getAllByRole('rowheader').map((cell) => cell.textContent);

describe('Ledger', () => {
  test('arrows, Home and End move among rows; / goes to the filter', async () => {
    const user = userEvent.setup();
    render(<Ledger label="Results" columns={columns} rows={rows} empty={empty} />);
    screen.getByRole('link', { name: 'Abara, Adaeze' }).focus();
    await user.keyboard('{ArrowDown}');
    expect(document.activeElement).toBe(screen.getByRole('link', { name: 'Dufresne, Gaëlle' }));
    await user.keyboard('{End}{ArrowDown}');
    expect(document.activeElement).toBe(screen.getByRole('link', { name: 'Kowal, Ulrike' }));
    expect(document.activeElement?.getAttribute('href')).toBe('/c');
    await user.keyboard('{Home}');
    expect(document.activeElement).toBe(screen.getByRole('link', { name: 'Abara, Adaeze' }));
    await user.keyboard('/');
    expect(document.activeElement).toBe(screen.getByRole('searchbox', { name: 'Filter Results' }));
    expect(screen.getByRole<HTMLInputElement>('searchbox').value).toBe('');
  });

  test('the filter reads every column, whatever accents and order of words', async () => {
    const user = userEvent.setup();
    render(<Ledger label="Results" columns={columns} rows={rows} empty={empty} />);
    await user.type(screen.getByRole('searchbox'), 'pass gaelle');
    expect(names()).toEqual(['Dufresne, Gaëlle']);
    expect(screen.getByText('1 of 3 rows')).toBeTruthy();
    await user.clear(screen.getByRole('searchbox'));
    await user.selectOptions(screen.getByRole('combobox', { name: 'Outcome' }), 'absent');
    expect(names()).toEqual(['Kowal, Ulrike']);
  });

  test('sorts numbers by size, what has no value last both ways, and says so to a screen reader', async () => {
    const user = userEvent.setup();
    render(<Ledger label="Results" columns={columns} rows={rows} empty={empty} />);
    const total = () => screen.getByRole('columnheader', { name: 'Total' });
    await user.click(within(total()).getByRole('button'));
    const first = total().getAttribute('aria-sort');
    const order = names();
    await user.click(within(total()).getByRole('button'));
    expect([first, total().getAttribute('aria-sort')].sort()).toEqual(['ascending', 'descending']);
    const ascending = first === 'ascending' ? order : names();
    const descending = first === 'ascending' ? names() : order;
    expect(ascending).toEqual(['Abara, Adaeze', 'Dufresne, Gaëlle', 'Kowal, Ulrike']);
    expect(descending).toEqual(['Dufresne, Gaëlle', 'Abara, Adaeze', 'Kowal, Ulrike']);
  });

  test('an action takes the selected rows that the filter still shows, and says what came of it', async () => {
    const user = userEvent.setup();
    const taken: string[][] = [];
    const bulk: BulkAction[] = [
      {
        label: 'Release',
        run: (ids) => {
          taken.push(ids);
          return { ok: ids.length > 1, says: ids.length > 1 ? 'Released.' : 'One alone is not released.' };
        },
      },
    ];
    render(<Ledger label="Results" columns={columns} rows={rows} empty={empty} bulk={bulk} />);
    screen.getByRole('link', { name: 'Abara, Adaeze' }).focus();
    await user.keyboard(' ');
    await user.click(screen.getByRole('checkbox', { name: 'Select Kowal, Ulrike' }));
    expect(screen.getByText('2 selected')).toBeTruthy();
    await user.type(screen.getByRole('searchbox'), 'kowal');
    await user.click(screen.getByRole('button', { name: 'Release' }));
    expect(await screen.findByText('One alone is not released.')).toBeTruthy();
    await user.clear(screen.getByRole('searchbox'));
    await user.click(screen.getByRole('button', { name: 'Release' }));
    expect(await screen.findByText('Released.')).toBeTruthy();
    expect(taken).toEqual([['c'], ['a', 'c']]);
    expect(screen.queryByText('2 selected')).toBeNull();
  });

  test('pages past 200 rows, says what to do when empty, hides a column on request', async () => {
    const user = userEvent.setup();
    const many = Array.from({ length: 201 }, (_, at): LedgerRow => ({ id: `${at}`, cells: { name: `check-${at}`, total: at, outcome: null } }));
    const { rerender } = render(<Ledger label="Draws" columns={columns} rows={many} empty={empty} />);
    expect(names()).toHaveLength(200);
    await user.click(screen.getByRole('button', { name: 'Next 1' }));
    expect(names()).toEqual(['check-200']);
    await user.click(screen.getByRole('checkbox', { name: 'Outcome', hidden: true }));
    expect(screen.queryByRole('columnheader', { name: 'Outcome' })).toBeNull();
    rerender(<Ledger label="Draws" columns={columns} rows={[]} empty={empty} />);
    expect(screen.getByText('Close the sitting first.')).toBeTruthy();
  });

  test('CSV: text that would run as a formula is escaped, numbers stay numbers', () => {
    const csv = ledgerCsv(
      [
        { key: 'name', title: 'Name' },
        { key: 'total', title: 'Total' },
      ],
      [
        { id: '1', cells: { name: '=HYPERLINK("x")', total: -3.5 } },
        { id: '2', cells: { name: 'Abara, "Ada"', total: null } },
        { id: '3', cells: { name: { value: '-12', show: 'minus twelve' }, total: 4 } },
      ],
    );
    expect(csv).toBe('\uFEFFName,Total\r\n"\'=HYPERLINK(""x"")",-3.5\r\n"Abara, ""Ada""",\r\n-12,4\r\n');
  });
});
