import type { ReactNode } from 'react';
import { Sign } from './Sign';
import { lookOf, type StateOf, type Thing } from './states';

/**
 * The word, shape and colour of a thing's state: `<StateMark thing="sitting" state="check-in" />`.
 * `children` replaces the printed word where it says more ("2 of 3", "check-in open"); `small` is for dense rows.
 */
export function StateMark<T extends Thing>(props: { thing: T; state: StateOf<T>; small?: boolean; children?: ReactNode }) {
  const look = lookOf(props.thing, props.state);
  return (
    <Sign shape={look.shape} tone={look.tone} small={props.small}>
      {props.children ?? look.word}
    </Sign>
  );
}
