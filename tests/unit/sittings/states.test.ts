import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { type CandidateClock, type CandidateEvent, candidateStates } from '@/lib/candidates/model';
import { nextCandidate, secondsLeftAt } from '@/lib/candidates/rules';
import { sittingEvents, type SittingState, sittingStates } from '@/lib/sittings/model';
import { nextSitting } from '@/lib/sittings/rules';

const fresh = (secondsAllowed: number, rest: number): CandidateClock => ({
  state: 'expected', secondsAllowed, startedAt: null, endsAt: null, secondsLeft: null,
  restSecondsAllowed: rest, restSecondsUsed: 0, restBeganAt: null, endedAt: null,
});

const event: fc.Arbitrary<CandidateEvent> = fc.oneof(
  ...(['admit', 'refuse', 'mark-absent', 'start', 'pause', 'resume', 'begin-rest', 'end-rest', 'hand-in', 'time-out', 'withdraw'] as const).map((kind) => fc.constant<CandidateEvent>({ kind })),
  fc.integer({ min: -60, max: 3600 }).map((seconds): CandidateEvent => ({ kind: 'add-time', seconds })),
  fc.integer({ min: 0, max: 3600 }).map((seconds): CandidateEvent => ({ kind: 'reopen', seconds })),
);
const steps = fc.array(fc.record({ event, wait: fc.integer({ min: 0, max: 2000 }) }), { maxLength: 40 });
const begin = Date.UTC(2026, 10, 1, 9);

/** Runs the steps and calls `look` after each that was taken. */
function walk(clock: CandidateClock, path: { event: CandidateEvent; wait: number }[], look: (before: CandidateClock, event: CandidateEvent, after: CandidateClock, now: Date) => void) {
  let at = begin;
  for (const step of path) {
    at += step.wait * 1000;
    const next = nextCandidate(clock, step.event, new Date(at));
    if (!next.ok) continue;
    look(clock, step.event, next.value, new Date(at));
    clock = next.value;
  }
}

describe('a candidate', () => {
  it('never leaves its states, and its clock either runs, stands or has ended', () => {
    fc.assert(fc.property(steps, fc.integer({ min: 60, max: 9000 }), fc.integer({ min: 0, max: 900 }), (path, allowed, rest) => {
      walk(fresh(allowed, rest), path, (_before, _event, after) => {
        expect(candidateStates).toContain(after.state);
        expect(after.endsAt !== null).toBe(after.state === 'writing');
        expect(after.secondsLeft !== null).toBe(after.state === 'paused' || after.state === 'on rest break');
        if (after.secondsLeft !== null) expect(after.secondsLeft).toBeGreaterThanOrEqual(0);
        expect(after.restSecondsUsed).toBeLessThanOrEqual(Math.max(rest, 0));
      });
    }));
  });

  it('keeps its time left through pause and resume, and loses none to a rest within its cap', () => {
    fc.assert(fc.property(fc.integer({ min: 300, max: 9000 }), fc.integer({ min: 0, max: 299 }), fc.integer({ min: 0, max: 9000 }), fc.integer({ min: 0, max: 600 }), (allowed, worked, stood, rested) => {
      const kinds = (kind: CandidateEvent['kind'], wait: number) => ({ event: { kind } as CandidateEvent, wait });
      let last = fresh(allowed, 600);
      let now = new Date(begin);
      walk(last, [kinds('admit', 0), kinds('start', 0), kinds('pause', worked), kinds('resume', stood), kinds('begin-rest', 0), kinds('end-rest', rested)], (_b, _e, after, at) => { last = after; now = at; });
      expect(secondsLeftAt(last, now)).toBeCloseTo(allowed - worked, 6);
    }));
  });

  it('gives 120 minutes and a quarter more exactly 150:00, whatever the clock change of the night', () => {
    const admitted = nextCandidate(fresh(120 * 60 * 1.25, 0), { kind: 'admit' }, new Date(begin));
    const started = admitted.ok && nextCandidate(admitted.value, { kind: 'start' }, new Date('2026-11-01T07:30:00Z'));
    expect(started && started.ok && started.value.endsAt).toEqual(new Date('2026-11-01T10:00:00Z'));
  });

  it('times out at the stated end, however late somebody looks', () => {
    fc.assert(fc.property(fc.integer({ min: 60, max: 9000 }), fc.integer({ min: 0, max: 90_000 }), (allowed, late) => {
      let last = fresh(allowed, 0);
      walk(last, [{ event: { kind: 'admit' }, wait: 0 }, { event: { kind: 'start' }, wait: 0 }, { event: { kind: 'hand-in' }, wait: allowed + late }, { event: { kind: 'time-out' }, wait: 0 }], (_b, _e, after) => { last = after; });
      expect(last.state).toBe('timed out');
      expect(last.endedAt).toEqual(new Date(begin + allowed * 1000));
    }));
  });
});

describe('a sitting', () => {
  it('never leaves its states and never comes back from an end', () => {
    const ends: readonly SittingState[] = ['reconciled', 'cancelled', 'abandoned'];
    fc.assert(fc.property(fc.array(fc.constantFrom(...sittingEvents), { maxLength: 30 }), fc.boolean(), (events, papersDrawn) => {
      let state: SittingState = 'planned';
      for (const each of events) {
        const next = nextSitting({ state, papersDrawn, opensAt: new Date(begin), startsAt: new Date(begin) }, each, new Date(begin));
        if (!next.ok) continue;
        expect(sittingStates).toContain(next.value);
        expect(ends).not.toContain(state);
        if (!papersDrawn) expect(next.value).toBe('cancelled');
        state = next.value;
      }
    }));
  });
});
