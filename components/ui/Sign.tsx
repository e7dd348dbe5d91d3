import type { ReactNode } from 'react';
import { Shape, type ShapeName } from './Shape';

export type Tone = 'ok' | 'info' | 'wait' | 'stop' | 'ink' | 'none';

/**
 * A shape, a word and a colour, always the three. For the states of things use StateMark; a Sign is for a
 * word of the moment ("40 of 2,000 draws").
 */
export function Sign({ shape, tone, small, children }: { shape: ShapeName; tone: Tone; small?: boolean; children: ReactNode }) {
  return (
    <span className={`state c-${tone}${small ? ' state--sm' : ''}`}>
      <Shape name={shape} />
      <span>{children}</span>
    </span>
  );
}
