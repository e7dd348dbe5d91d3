import type { ReactNode } from 'react';

/** at: the time as printed; machine: the same in ISO 8601. */
export type TimelineEntry = { key: string; at: string; machine: string; says: ReactNode };

/** What happened, latest first unless the page says otherwise. */
export function Timeline({ entries }: { entries: readonly TimelineEntry[] }) {
  return (
    <ol className="timeline">
      {entries.map((entry) => (
        <li key={entry.key}>
          <time dateTime={entry.machine}>{entry.at}</time>
          <span>{entry.says}</span>
        </li>
      ))}
    </ol>
  );
}
