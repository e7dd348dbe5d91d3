import type { ReactNode } from 'react';
import { Figures } from '../Figures';
import { valueOf, type LedgerCell, type LedgerColumn } from './model';

/** A number with room kept for the decimals of its column, so that points stand under each other. */
function Numeral({ value, fixed, room }: { value: number; fixed: boolean; room: number }) {
  const text = (fixed ? value.toFixed(room) : String(value)).replace(/^-/, '−');
  const missing = fixed ? 0 : room - (text.split('.')[1]?.length ?? 0);
  const pad = missing === 0 ? '' : `${text.includes('.') ? '' : '.'}${'0'.repeat(missing)}`;
  return (
    <>
      <Figures text={text} />
      {pad && (
        <span className="pad" aria-hidden="true">
          {pad}
        </span>
      )}
    </>
  );
}

export function cellText(cell: LedgerCell | undefined, column: LedgerColumn, room: number): ReactNode {
  if (typeof cell === 'object' && cell !== null) return cell.show;
  const value = valueOf(cell);
  if (value === null || value === '') return column.figures === undefined ? '' : '–';
  if (typeof value === 'number' && column.figures !== undefined) return <Numeral value={value} fixed={column.figures !== true} room={room} />;
  return String(value);
}

export const cellClass = (column: LedgerColumn): string | undefined =>
  [column.figures === undefined ? '' : 'n', column.rule ? 'dbl' : ''].filter(Boolean).join(' ') || undefined;
