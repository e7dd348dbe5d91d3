'use client';

import './globals.css';

/** The last net: the root layout itself failed. */
export default function GlobalError({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <html lang="en">
      <body>
        <main className="page">
          <title>Fullfield could not start this page</title>
          <h1>Fullfield could not start this page</h1>
          <p>What you had saved is safe. Try again. If it fails again, give the exam office this number: {error.digest ?? 'none'}</p>
          <div className="btn-row mt-6">
            <button type="button" className="btn btn--main" onClick={reset}>
              Try again
            </button>
          </div>
        </main>
      </body>
    </html>
  );
}
