import type { ReactNode } from 'react';
import { Brand } from './Mark';

/** Pages for anyone: the mark, one column, nothing else. */
export function PublicShell({ school, children }: { school?: string; children: ReactNode }) {
  return (
    <>
      <header className="plainbar">
        <Brand school={school} />
      </header>
      <main className="page" id="main" tabIndex={-1}>
        <div className="mx-auto max-w-sheet">{children}</div>
      </main>
    </>
  );
}
