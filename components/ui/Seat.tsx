import type { ReactNode } from 'react';
import { Sign } from './Sign';
import { StateMark } from './StateMark';
import type { StateOf } from './states';

type SeatProps = {
  /** `need` is what a proctor must give ("+25 %", "rest"), never why. */
  person: { seat: string; name: string; need?: string };
  state: StateOf<'candidate'>;
  /** What wants a look beside the state. */
  signal?: StateOf<'signal'> | null;
  progress: { answered: number; of: number };
  /** Time left, time of the end, or "stopped". */
  left: string;
  select?: { selected: boolean; onSelect: () => void };
};

const signalLooks: Record<StateOf<'signal'>, string> = { 'lost contact': 'stop', 'help called': 'info', 'incident noted': 'wait' };

function seatClass(state: StateOf<'candidate'>, signal: SeatProps['signal']): string {
  if (signal) return `seat seat--look seat--${signalLooks[signal]}`;
  if (state === 'paused' || state === 'on rest break') return 'seat seat--look seat--wait';
  if (state === 'expected' || state === 'absent' || state === 'refused') return 'seat seat--none';
  return state === 'handed in' ? 'seat seat--done' : 'seat';
}

function Ticks({ answered, of }: { answered: number; of: number }) {
  return (
    <span className="seat__ticks" aria-hidden="true">
      {Array.from({ length: of }, (_, place) => (
        <i key={place} className={place < answered ? 'on' : undefined} />
      ))}
    </span>
  );
}

/** A plate for one candidate on the proctor's board; what wants a look stands out by border, wash, shape and word. */
export function Seat({ person, state, signal, progress, left, select }: SeatProps) {
  const gone = state === 'expected' || state === 'absent' || state === 'refused';
  const mark = signal ? (
    <StateMark thing="signal" state={signal} small />
  ) : state === 'writing' ? (
    // The usual case stands back, so that the others stand out.
    <Sign shape="half" tone="none" small>
      writing
    </Sign>
  ) : (
    <StateMark thing="candidate" state={state} small />
  );
  const inside: ReactNode = (
    <>
      <span className="seat__top">
        <span>{person.seat}</span>
        {person.need && <span className="need">{person.need}</span>}
      </span>
      <span className="seat__name">{person.name}</span>
      {mark}
      {!gone && (
        <>
          <Ticks {...progress} />
          <span className="seat__foot">
            <span>
              {progress.answered} of {progress.of}
            </span>
            <b>{left}</b>
          </span>
        </>
      )}
    </>
  );
  const look = seatClass(state, signal);
  if (!select) return <article className={look}>{inside}</article>;
  return (
    <button type="button" className={look} aria-pressed={select.selected} onClick={select.onSelect}>
      {inside}
    </button>
  );
}
