import type { ComponentProps } from 'react';
import { buttonClass, type ButtonLook, type ButtonSize } from './button-class';
import { Shape, type ShapeName } from './Shape';

type ButtonProps = ComponentProps<'button'> & { look?: ButtonLook; size?: ButtonSize; shape?: ShapeName; busy?: boolean };

/**
 * look: main | plain | quiet | stop | stop-main. size: dense 32 | control 40 | touch 44 | exam 48.
 * `busy` keeps the label, refuses a second press and tells a screen reader. Type is "button" unless said.
 * With `aria-pressed` it is a switch (Flag).
 */
export function Button({ look, size, shape, busy, className, children, ...rest }: ButtonProps) {
  return (
    <button type="button" {...rest} className={buttonClass(look, size, className)} disabled={rest.disabled || busy} aria-busy={busy || undefined}>
      {shape && <Shape name={shape} />}
      {children}
    </button>
  );
}
