import type { ReactNode } from 'react';
import { Shape } from './Shape';

/** The safety line beside dangerous content: the hazard in `title`, then what it is for and who decides. */
export function Caution({ title, children }: { title: string; children?: ReactNode }) {
  return (
    <div className="caution" role="note" aria-label="Caution">
      <Shape name="tri" />
      <div>
        <b>{title}</b> {children}
      </div>
    </div>
  );
}
