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
