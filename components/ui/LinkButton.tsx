import Link from 'next/link';
import type { ComponentProps } from 'react';
import { buttonClass, type ButtonLook, type ButtonSize } from './button-class';

/** A link that looks like a Button: for going somewhere, never for doing something. `document` makes it a full navigation (downloads, leaving the exam room). */
export function LinkButton({ look, size, document, className, ...rest }: ComponentProps<typeof Link> & { look?: ButtonLook; size?: ButtonSize; document?: boolean }) {
  const style = buttonClass(look, size, className);
  if (document && typeof rest.href === 'string') {
    return (
      <a href={rest.href} className={style} id={rest.id}>
        {rest.children}
      </a>
    );
  }
  return <Link {...rest} className={style} />;
}
