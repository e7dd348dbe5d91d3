import type { ReactNode } from 'react';

export type TallyCount = { key: string; count: number; mark: ReactNode };

/** Counts first: a cell for each state that somebody is in (`mark` a StateMark); at the end one figure with its word. */
export function Tally({ label, counts, end }: { label: string; counts: readonly TallyCount[]; end?: { figure: string; says: string } }) {
  return (
    <div className="tally" role="group" aria-label={label}>
      {counts.map((one) => (
        <span className="tally__cell" key={one.key}>
          <b>{one.count}</b> {one.mark}
        </span>
      ))}
      {end && (
        <span className="tally__end">
          <b>{end.figure}</b> <span>{end.says}</span>
        </span>
      )}
    </div>
  );
}
