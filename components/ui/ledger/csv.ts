import { valueOf, type CellValue, type LedgerColumn, type LedgerRow } from './model';

/** Text that a spreadsheet would run as a formula gets an apostrophe before it; a number stays a number. */
function csvCell(value: CellValue): string {
  if (value === null) return '';
  if (typeof value === 'number') return String(value);
  const safe = /^[=+\-@\t\r]/.test(value) && !/^[+-]?\d+([.,]\d+)?$/.test(value) ? `'${value}` : value;
  return /[",\r\n]/.test(safe) ? `"${safe.replaceAll('"', '""')}"` : safe;
}

/** RFC 4180 with a byte-order mark, since spreadsheets read UTF-8 only then. */
export function ledgerCsv(columns: readonly LedgerColumn[], rows: readonly LedgerRow[]): string {
  const lines = [columns.map((column) => csvCell(column.title))];
  for (const row of rows) lines.push(columns.map((column) => csvCell(valueOf(row.cells[column.key]))));
  return `\uFEFF${lines.map((line) => line.join(',')).join('\r\n')}\r\n`;
}

export function saveText(name: string, text: string): void {
  const address = URL.createObjectURL(new Blob([text], { type: 'text/csv;charset=utf-8' }));
  const link = document.createElement('a');
  link.href = address;
  link.download = name;
  link.click();
  URL.revokeObjectURL(address);
}
