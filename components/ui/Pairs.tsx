import type { ReactNode } from 'react';

export type Pair = { label: string; value: ReactNode };

/** Facts in two columns, a hairline under each: what it is, what it is here. */
export function Pairs({ pairs }: { pairs: readonly Pair[] }) {
  return (
    <dl className="pairs">
      {pairs.map((pair) => (
        <div key={pair.label}>
          <dt>{pair.label}</dt>
          <dd>{pair.value}</dd>
        </div>
      ))}
    </dl>
  );
}
