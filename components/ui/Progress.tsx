import type { ReactNode } from 'react';
import { Figures } from './Figures';

type ProgressProps = {
  label: string;
  done: number;
  /** null while the whole is not known. */
  of: number | null;
  /** What is counted: "draws", "rows", "reports". */
  unit: string;
  /** What is known so far ("2 problems"). */
  says?: ReactNode;
  /** A quiet Button that cancels. */
  cancel?: ReactNode;
};

/** Long work with counts. It goes on when the page is left; the page that shows it reads it again. */
export function Progress({ label, done, of, unit, says, cancel }: ProgressProps) {
  const share = of === null || of === 0 ? 0 : Math.min(1, done / of);
  return (
    <div className="progress">
      <div className="progress__top">
        <span className="strong">{label}</span>
        <span className="num">
          <Figures text={String(done)} />
          {of !== null && (
            <>
              {' of '}
              <Figures text={String(of)} />
            </>
          )}{' '}
          {unit}
        </span>
      </div>
      <div
        className="progress__bar"
        role="progressbar"
        aria-label={label}
        aria-valuemin={0}
        aria-valuemax={of ?? undefined}
        aria-valuenow={of === null ? undefined : done}
        aria-valuetext={of === null ? `${done} ${unit}` : `${done} of ${of} ${unit}`}
      >
        <i style={{ transform: `scaleX(${share})` }} />
      </div>
      {(says || cancel) && (
        <div className="progress__foot">
          <span>{says}</span>
          {cancel}
        </div>
      )}
    </div>
  );
}
