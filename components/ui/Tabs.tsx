'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import type { ReactNode } from 'react';

export type Tab = { href: string; label: string; mark?: ReactNode };

/** Views of one thing, each with its own address; the one whose address is open is marked. */
export function Tabs({ label, tabs }: { label: string; tabs: readonly Tab[] }) {
  const here = usePathname();
  return (
    <nav className="tabs" aria-label={label}>
      {tabs.map((tab) => (
        <Link key={tab.href} href={tab.href} aria-current={here === tab.href ? 'page' : undefined}>
          {tab.label} {tab.mark}
        </Link>
      ))}
    </nav>
  );
}
