'use client';

import { useEffect, useId, useRef } from 'react';

export type FieldTrouble = { field?: string; says: string };

/**
 * What is to be put right, above the fields; takes focus whenever `attempt` (the count of submits) changes
 * while there is something to say. A trouble with `field` links to the control of that name or id.
 */
export function ErrorSummary({ errors, attempt = 0, title = 'Put this right first' }: { errors: readonly FieldTrouble[]; attempt?: number; title?: string }) {
  const heading = useId();
  const box = useRef<HTMLDivElement>(null);
  const some = errors.length > 0;
  useEffect(() => {
    if (some) box.current?.focus();
  }, [some, attempt]);
  if (!some) return null;
  const go = (field: string) => {
    const controls = [...(box.current?.closest('form')?.elements ?? [])];
    const control = document.getElementById(field) ?? controls.find((one) => one.getAttribute('name') === field);
    if (control instanceof HTMLElement) control.focus();
  };
  return (
    <div className="errors" role="group" aria-labelledby={heading} tabIndex={-1} ref={box}>
      <h2 id={heading} className="text-18">
        {title}
      </h2>
      <ul>
        {errors.map((error) => (
          <li key={`${error.field ?? ''}:${error.says}`}>
            {error.field ? (
              <a
                href={`#${error.field}`}
                onClick={(event) => {
                  event.preventDefault();
                  go(error.field ?? '');
                }}
              >
                {error.says}
              </a>
            ) : (
              error.says
            )}
          </li>
        ))}
      </ul>
    </div>
  );
}
