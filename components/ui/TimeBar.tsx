import type { CSSProperties } from 'react';
import { lastSeconds } from './clock-text';

const quarterHour = 900;

/** The thin bar along the top edge, graduated each 15 minutes; the Clock says the same in words. Seconds left of seconds allowed. */
export function TimeBar({ seconds, allowed, stopped }: { seconds: number; allowed: number; stopped?: boolean }) {
  const share = allowed > 0 ? Math.max(0, Math.min(1, seconds / allowed)) : 0;
  const style = { '--left': `${share * 100}%`, '--step': `${allowed > quarterHour ? (quarterHour / allowed) * 100 : 100}%` } as CSSProperties;
  return (
    <div className={`timebar${stopped ? ' is-stopped' : seconds <= lastSeconds ? ' is-low' : ''}`} style={style} aria-hidden="true">
      <i />
    </div>
  );
}
