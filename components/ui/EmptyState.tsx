import type { ReactNode } from 'react';

/** Where nothing is yet: what is missing, what to do next, and the button for it. */
export function EmptyState({ title, says, children }: { title: string; says: ReactNode; children?: ReactNode }) {
  return (
    <div className="empty">
      <h2>{title}</h2>
      <p>{says}</p>
      {children && <div className="btn-row">{children}</div>}
    </div>
  );
}
