'use client';

import Link from 'next/link';
import { useEffect, useRef } from 'react';
import { Button } from '@/components/ui/Button';

/** What went wrong inside a page: what to do, and the number under which the server's log has it. */
export default function PageError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  const heading = useRef<HTMLHeadingElement>(null);
  useEffect(() => heading.current?.focus(), []);
  return (
    <main className="page" id="main">
      <title>This page could not be shown · Fullfield</title>
      <div className="mx-auto max-w-measure">
        <h1 tabIndex={-1} ref={heading}>
          This page could not be shown
        </h1>
        <p className="mt-2">Something in the program failed; what you had saved is safe. Try again. If it fails again, give the exam office this number:</p>
        <p className="mt-4 num text-22">{error.digest ?? 'none, the fault is in this browser'}</p>
        <div className="btn-row mt-6">
          <Button look="main" onClick={reset}>
            Try again
          </Button>
          <Link className="btn" href="/">
            Go to the start
          </Link>
        </div>
      </div>
    </main>
  );
}
