'use client';

import { useEffect, useState } from 'react';

/** The server's time, renewed a few times a second, so that the numerals never lag by a whole one. */
export function useServerNow(now: () => number): number {
  const [shown, setShown] = useState(now);
  useEffect(() => {
    const tick = setInterval(() => setShown(now()), 250);
    return () => clearInterval(tick);
  }, [now]);
  return shown;
}

/** A time of day in a zone, "11:25". */
export const timeIn = (time: number, zone: string, locale: string): string =>
  new Intl.DateTimeFormat(locale, { timeZone: zone, hour: '2-digit', minute: '2-digit', hour12: false }).format(time);
