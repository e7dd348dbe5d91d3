import type { Allowance } from './model';

export const noAllowance: Allowance = { extraPercent: 0, extraMinutes: 0, restMinutes: 0, largePrint: false, separateRoom: false };

/** The most that any of several accommodations gives: they stand beside each other and do not add up. */
export const mostOf = (allowances: readonly Allowance[]): Allowance =>
  allowances.reduce(
    (most, one) => ({
      extraPercent: Math.max(most.extraPercent, one.extraPercent),
      extraMinutes: Math.max(most.extraMinutes, one.extraMinutes),
      restMinutes: Math.max(most.restMinutes, one.restMinutes),
      largePrint: most.largePrint || one.largePrint,
      separateRoom: most.separateRoom || one.separateRoom,
    }),
    noAllowance,
  );

/** Time allowed to one candidate [s]: minutes × (1 + percent / 100), and the extra minutes. 120 min and 25 % are 150:00. */
export const secondsAllowed = (minutes: number, allowance: Pick<Allowance, 'extraPercent' | 'extraMinutes'>): number =>
  Math.round((minutes * 60 * (100 + allowance.extraPercent)) / 100) + allowance.extraMinutes * 60;

/** What a proctor has to know, never why. Empty where there is nothing. */
export function needSays(allowance: Allowance): string {
  const needs = [
    allowance.extraPercent > 0 ? `+${allowance.extraPercent} %` : '',
    allowance.extraMinutes > 0 ? `+${allowance.extraMinutes} min` : '',
    allowance.restMinutes > 0 ? `rest ${allowance.restMinutes} min` : '',
    allowance.largePrint ? 'large print' : '',
    allowance.separateRoom ? 'separate room' : '',
  ];
  return needs.filter(Boolean).join(', ');
}

const seatsInRow = 6;

/** Seat of the nth candidate (from 0) in a room of rows: A1 … A6, B1 … */
export function defaultSeat(place: number): string {
  let row = Math.floor(place / seatsInRow);
  let letters = '';
  do {
    letters = String.fromCharCode(65 + (row % 26)) + letters;
    row = Math.floor(row / 26) - 1;
  } while (row >= 0);
  return `${letters}${(place % seatsInRow) + 1}`;
}

/** The first default seat that nobody has. */
export function freeSeat(taken: ReadonlySet<string>): string {
  let place = 0;
  while (taken.has(defaultSeat(place))) place += 1;
  return defaultSeat(place);
}

export type PlanFacts = {
  candidates: number;
  papers: number;
  proctors: number;
  /** A proctor looks after so many candidates at most, by the school's settings. */
  candidatesPerProctor: number;
  seatless: number;
  sharedSeats: string[];
  drawing: boolean;
  failed: string;
};
export type Readiness = { code: string; ready: boolean; says: string };

const count = (n: number, one: string, many = `${one}s`): string => `${n} ${n === 1 ? one : many}`;

function papersReady(facts: PlanFacts): Readiness {
  const all = facts.candidates > 0 && facts.papers >= facts.candidates;
  if (facts.failed) return { code: 'papers', ready: false, says: `The papers could not be drawn: ${facts.failed}` };
  if (all && !facts.drawing) return { code: 'papers', ready: true, says: `${count(facts.papers, 'paper')} drawn and stored.` };
  return { code: 'papers', ready: false, says: `${facts.papers} of ${count(facts.candidates, 'paper')} drawn.` };
}

/** What of a planned sitting is ready and what is missing, a line each. */
export function readiness(facts: PlanFacts): Readiness[] {
  const wanted = Math.max(1, Math.ceil(facts.candidates / facts.candidatesPerProctor));
  return [
    { code: 'candidates', ready: facts.candidates > 0, says: facts.candidates > 0 ? `${count(facts.candidates, 'candidate')} on the list.` : 'Nobody is on the list: enrol students in the class, then add them here.' },
    papersReady(facts),
    facts.proctors >= wanted
      ? { code: 'proctors', ready: true, says: `${count(facts.proctors, 'proctor')} assigned.` }
      : { code: 'proctors', ready: false, says: facts.proctors === 0 ? 'No proctor is assigned: without one, check-in cannot be opened.' : `${count(facts.proctors, 'proctor')} assigned; the school wants ${wanted} for ${count(facts.candidates, 'candidate')}.` },
    facts.seatless === 0 && facts.sharedSeats.length === 0
      ? { code: 'seats', ready: true, says: 'Every candidate has a seat.' }
      : { code: 'seats', ready: false, says: facts.sharedSeats.length > 0 ? `Given twice: ${facts.sharedSeats.join(', ')}.` : `${count(facts.seatless, 'candidate')} without a seat.` },
  ];
}
