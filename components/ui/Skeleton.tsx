/** A still shape of what is coming: width and height as CSS lengths. */
export function Skeleton({ width = '100%', height = '1rem' }: { width?: string; height?: string }) {
  return <span className="skeleton" style={{ width, height }} aria-hidden="true" />;
}

/** The shape of a page with a head and a ledger, for loading.tsx. */
export function LedgerSkeleton({ rows = 8 }: { rows?: number }) {
  return (
    <div role="status" aria-label="The page is on its way">
      <div className="page__head">
        <div className="grid gap-2">
          <Skeleton width="12rem" height="2.25rem" />
          <Skeleton width="min(32rem, 100%)" />
        </div>
      </div>
      <div className="grid grid-cols-[minmax(0,1fr)] gap-px border-t-2 border-ink pt-9">
        {Array.from({ length: rows }, (_, row) => (
          <div key={row} className="flex min-h-11 items-center gap-6 overflow-hidden border-b border-rule bg-sheet px-3">
            <Skeleton width={`${14 + ((row * 5) % 9)}rem`} />
            <span className="flex-1" />
            <Skeleton width="3rem" />
            <Skeleton width="5rem" />
          </div>
        ))}
      </div>
    </div>
  );
}

/** The shape of a page with a head and one sheet to read. */
export function SheetSkeleton({ lines = 6 }: { lines?: number }) {
  return (
    <div role="status" aria-label="The page is on its way">
      <div className="page__head">
        <div className="grid gap-2">
          <Skeleton width="16rem" height="2.25rem" />
          <Skeleton width="min(28rem, 100%)" />
        </div>
      </div>
      <div className="sheet sheet--pad grid gap-4">
        {Array.from({ length: lines }, (_, line) => (
          <Skeleton key={line} width={`${60 + ((line * 17) % 40)}%`} />
        ))}
      </div>
    </div>
  );
}
