'use client';

import Link from 'next/link';
import { usePathname } from 'next/navigation';
import { Menu } from './Menu';

export type Place = { href: string; label: string };

function PlaceLinks({ places }: { places: readonly Place[] }) {
  const here = usePathname();
  return places.map((place) => (
    <Link key={place.href} href={place.href} aria-current={here === place.href || here.startsWith(`${place.href}/`) ? 'page' : undefined}>
      {place.label}
    </Link>
  ));
}

/** The places that this role may enter; the one that is open is marked. */
export function Places({ places }: { places: readonly Place[] }) {
  return (
    <nav className="places" aria-label="Places">
      <PlaceLinks places={places} />
    </nav>
  );
}

/** The same behind a button, where the bar is too narrow for them. */
export function PlacesMenu({ places }: { places: readonly Place[] }) {
  return (
    <Menu label="Places" className="menu--places">
      <nav aria-label="Places">
        <PlaceLinks places={places} />
      </nav>
    </Menu>
  );
}
