import type { ReactNode } from 'react';

/** One part with its name at the left. */
export function Section({ title, says, children }: { title: string; says?: string; children: ReactNode }) {
  return (
    <section className="grid gap-x-8 gap-y-3 border-t-2 border-ink py-8 grid-cols-[minmax(0,1fr)] md:grid-cols-[10.5rem_minmax(0,1fr)]">
      <h2 className="text-18">
        {title}
        {says && <small className="help block font-sans">{says}</small>}
      </h2>
      <div className="grid min-w-0 grid-cols-[minmax(0,1fr)] gap-5">{children}</div>
    </section>
  );
}
