'use client';

import { useState } from 'react';
import { clockText, crossedMinutes, lastSeconds } from './clock-text';

/**
 * Remaining time of a sitting, from seconds that the server's clock gives. Announces 10, 5 and 1 minutes; never
 * blinks. `says` stands beneath ("left · ends 11:25", "stopped by the proctor"). With `onHide` the candidate may
 * hide it until the last 5 minutes.
 */
export function Clock(props: { seconds: number; says: string; stopped?: boolean; hidden?: boolean; onHide?: (hidden: boolean) => void }) {
  const { seconds, stopped } = props;
  const [heard, setHeard] = useState({ seconds, announced: '' });
  if (heard.seconds !== seconds) {
    const minutes = stopped ? null : crossedMinutes(heard.seconds, seconds);
    setHeard({ seconds, announced: minutes ? `${minutes} ${minutes === 1 ? 'minute' : 'minutes'} left` : heard.announced });
  }
  const low = !stopped && seconds <= lastSeconds;
  const hidden = props.hidden === true && !low;
  return (
    <div className={`clock${stopped ? ' is-stopped' : low ? ' is-low' : ''}`}>
      <div className="clock__t" role="timer" aria-label="Time left">
        {hidden ? '–:––' : clockText(seconds)}
      </div>
      <div className="clock__s">
        {hidden ? 'shown again at 5 minutes' : props.says}
        {props.onHide && !low && (
          <>
            {' · '}
            <button type="button" onClick={() => props.onHide?.(!hidden)}>
              {hidden ? 'show' : 'hide'}
            </button>
          </>
        )}
      </div>
      <span className="vh" role="status">
        {heard.announced}
      </span>
    </div>
  );
}
