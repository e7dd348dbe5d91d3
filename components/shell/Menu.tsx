'use client';

import { useEffect, useRef, type ReactNode } from 'react';
import { Shape } from '@/components/ui/Shape';

/** A button and what it shows. Escape shuts it and gives the focus back; so does a press outside or on a link inside. */
export function Menu({ label, className, children }: { label: ReactNode; className?: string; children: ReactNode }) {
  const box = useRef<HTMLDetailsElement>(null);
  useEffect(() => {
    const shut = (event: Event) => {
      const menu = box.current;
      if (!menu?.open) return;
      const inside = event.target instanceof Node && menu.contains(event.target);
      if (event instanceof KeyboardEvent) {
        if (event.key !== 'Escape') return;
        menu.open = false;
        if (inside) menu.querySelector('summary')?.focus();
      } else if (!inside || (event.target instanceof Element && event.target.closest('a'))) {
        menu.open = false;
      }
    };
    document.addEventListener('keydown', shut);
    document.addEventListener('click', shut);
    return () => {
      document.removeEventListener('keydown', shut);
      document.removeEventListener('click', shut);
    };
  }, []);
  return (
    <details className={`menu${className ? ` ${className}` : ''}`} ref={box}>
      <summary>
        {label}
        <Shape name="arrow" />
      </summary>
      <div className="menu__sheet">{children}</div>
    </details>
  );
}
