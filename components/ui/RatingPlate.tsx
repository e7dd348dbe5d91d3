import type { CSSProperties } from 'react';
import { Figures } from './Figures';

/** symbol: `R_a` prints R with a lowered a. value: text as printed. unit: as printed ("Ω"). */
export type PlateCell = { label: string; symbol?: string; value: string; unit?: string };

/** A quantity's symbol in italics; what follows an underscore is lowered. */
export function QuantitySymbol({ name }: { name: string }) {
  const [letter, lowered] = name.split(/_\{?/, 2);
  return (
    <i>
      {letter}
      {lowered && <sub>{lowered.replace(/\}$/, '')}</sub>}
    </i>
  );
}

/**
 * kind: `drawn` (this candidate's values, copper), `machine` (data in ink), `record` (identity of a candidate or sitting, in words).
 * columns: the most columns (3 unless said); a narrow screen takes fewer by itself. dense: the small plate.
 */
export function RatingPlate(props: { label: string; cells: readonly PlateCell[]; kind?: 'drawn' | 'machine' | 'record'; columns?: number; dense?: boolean }) {
  const { label, cells, kind = 'machine', columns = 3, dense } = props;
  const style = { '--cols': Math.max(1, Math.min(columns, cells.length)) } as CSSProperties;
  const look = kind === 'machine' ? '' : ` plate--${kind}`;
  return (
    <div className={`plate${look}${dense ? ' plate--sm' : ''}`} role="group" aria-label={label}>
      <dl style={style}>
        {cells.map((cell) => (
          <div className="cell" key={`${cell.label}:${cell.symbol ?? ''}`}>
            <dt>
              {cell.label} {cell.symbol && <QuantitySymbol name={cell.symbol} />}
            </dt>
            <dd>
              <span className="v">{kind === 'record' ? cell.value : <Figures text={cell.value} />}</span>
              {cell.unit && <span className="u">{cell.unit}</span>}
            </dd>
          </div>
        ))}
      </dl>
    </div>
  );
}
