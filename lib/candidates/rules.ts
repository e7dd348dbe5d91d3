import { done, refuse, type Result } from '@/lib/result';
import type { CandidateClock, CandidateEvent, CandidateState } from './model';

export type CandidateRefusal = 'wrong-state' | 'time-over' | 'no-rest-left' | 'no-time';

const allowed: Record<CandidateEvent['kind'], readonly CandidateState[]> = {
  admit: ['expected', 'absent', 'refused'],
  refuse: ['expected'],
  'mark-absent': ['expected'],
  start: ['admitted'],
  pause: ['writing'],
  resume: ['paused'],
  'begin-rest': ['writing'],
  'end-rest': ['on rest break'],
  'add-time': ['admitted', 'writing', 'paused', 'on rest break'],
  'hand-in': ['writing', 'paused', 'on rest break'],
  'time-out': ['writing'],
  withdraw: ['admitted', 'writing', 'paused', 'on rest break'],
  reopen: ['handed in', 'timed out'],
};

const seconds = (from: Date, to: Date): number => (to.getTime() - from.getTime()) / 1000;
const later = (from: Date, by: number): Date => new Date(from.getTime() + Math.round(by * 1000));

/** Seconds still to work at `now`; never below zero. Before the start it is the whole time allowed. */
export function secondsLeftAt(clock: CandidateClock, now: Date): number {
  if (clock.endsAt) return Math.max(0, seconds(now, clock.endsAt));
  if (clock.secondsLeft !== null) return clock.secondsLeft;
  return clock.startedAt ? 0 : clock.secondsAllowed;
}

const stop = (clock: CandidateClock, now: Date, state: CandidateState): CandidateClock => ({
  ...clock, state, secondsLeft: secondsLeftAt(clock, now), endsAt: null,
});
const run = (clock: CandidateClock, now: Date, left: number): CandidateClock => ({
  ...clock, state: 'writing', secondsLeft: null, endsAt: later(now, left), restBeganAt: null,
});
const end = (clock: CandidateClock, at: Date, state: CandidateState): CandidateClock => ({
  ...clock, state, endsAt: null, secondsLeft: null, restBeganAt: null, endedAt: at,
});

/** A rest break stands still up to its cap; what goes beyond is taken from the working time. */
function endRest(clock: CandidateClock, now: Date): CandidateClock {
  const taken = clock.restBeganAt ? seconds(clock.restBeganAt, now) : 0;
  const free = Math.max(0, clock.restSecondsAllowed - clock.restSecondsUsed);
  const left = Math.max(0, (clock.secondsLeft ?? 0) - Math.max(0, taken - free));
  return { ...run(clock, now, left), restSecondsUsed: clock.restSecondsUsed + Math.ceil(Math.min(taken, free)) };
}

function addTime(clock: CandidateClock, by: number): CandidateClock {
  const secondsAllowed = clock.secondsAllowed + by;
  if (clock.endsAt) return { ...clock, secondsAllowed, endsAt: later(clock.endsAt, by) };
  return { ...clock, secondsAllowed, secondsLeft: clock.secondsLeft === null ? null : clock.secondsLeft + by };
}

/**
 * The candidate after `event` at `now` (database time), or a coded refusal.
 * A paper whose time is over at `now` can only be timed out: its end is the stated one, not the moment somebody noticed.
 */
export function nextCandidate(clock: CandidateClock, event: CandidateEvent, now: Date): Result<CandidateClock, CandidateRefusal> {
  if (!allowed[event.kind].includes(clock.state)) return refuse('wrong-state', `That cannot be done while the candidate is ${clock.state}.`);
  const over = clock.state === 'writing' && clock.endsAt !== null && now >= clock.endsAt;
  if (over && event.kind !== 'time-out') return refuse('time-over', 'The time of this candidate is over.');
  switch (event.kind) {
    case 'admit': return done({ ...clock, state: 'admitted', endedAt: null });
    case 'refuse': return done({ ...clock, state: 'refused' });
    case 'mark-absent': return done({ ...clock, state: 'absent' });
    case 'start': return start(clock, event.seconds ?? clock.secondsAllowed, now);
    case 'pause': return done(stop(clock, now, 'paused'));
    case 'resume': return done(run(clock, now, clock.secondsLeft ?? 0));
    case 'begin-rest':
      return clock.restSecondsUsed < clock.restSecondsAllowed
        ? done({ ...stop(clock, now, 'on rest break'), restBeganAt: now })
        : refuse('no-rest-left', 'This candidate has no rest time left.');
    case 'end-rest': return done(endRest(clock, now));
    case 'add-time': return event.seconds > 0 ? done(addTime(clock, event.seconds)) : refuse('no-time', 'Give the number of minutes to add.');
    case 'hand-in': return done(end(clock, now, 'handed in'));
    case 'time-out':
      return over && clock.endsAt ? done(end(clock, clock.endsAt, 'timed out')) : refuse('wrong-state', 'The time of this candidate is not over.');
    case 'withdraw': return done(end(clock, now, 'withdrawn'));
    case 'reopen':
      return event.seconds > 0
        ? done({ ...run(clock, now, event.seconds), endedAt: null, secondsAllowed: clock.secondsAllowed })
        : refuse('no-time', 'Give the number of minutes to work on.');
  }
}

function start(clock: CandidateClock, allowedSeconds: number, now: Date): Result<CandidateClock, CandidateRefusal> {
  if (allowedSeconds <= 0) return refuse('no-time', 'There is no time left to start with.');
  return done({ ...run(clock, now, allowedSeconds), secondsAllowed: allowedSeconds, startedAt: now });
}
