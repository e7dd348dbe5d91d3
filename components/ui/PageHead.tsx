import Link from 'next/link';
import type { ReactNode } from 'react';

/**
 * The head of a page: title, one line that says what the page is for, the primary action(s) at the right;
 * `back` leads to the page above.
 */
export function PageHead(props: { title: ReactNode; says?: ReactNode; back?: { href: string; label: string }; children?: ReactNode }) {
  return (
    <div className="page__head">
      <div>
        {props.back && (
          <Link className="page__back" href={props.back.href}>
            {props.back.label}
          </Link>
        )}
        <h1>{props.title}</h1>
        {props.says && <p>{props.says}</p>}
      </div>
      {props.children && <div className="btn-row">{props.children}</div>}
    </div>
  );
}
