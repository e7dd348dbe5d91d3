import type { Metadata } from 'next';
import Link from 'next/link';

export const metadata: Metadata = { title: 'Nothing here' };

/** Missing and forbidden look alike. */
export default function NotFound() {
  return (
    <main className="page" id="main" tabIndex={-1}>
      <div className="mx-auto max-w-measure">
        <h1>Nothing here</h1>
        <p className="mt-2">There is nothing at this address, or it is not yours to see. Check the address, or sign in with the account that may see it.</p>
        <div className="btn-row mt-6">
          <Link className="btn btn--main" href="/">
            Go to the start
          </Link>
        </div>
      </div>
    </main>
  );
}
