import type { CandidateState } from '@/lib/candidates/model';
import type { SittingState } from './model';

/** Seconds without a sign of life after which a seated candidate counts as out of contact. */
export const contactLostAfter = 30;

/** One candidate as the board shows it. Times in milliseconds of the database's clock. */
export type BoardSeat = {
  candidateId: string;
  name: string;
  learnerNumber: string | null;
  seat: string;
  state: CandidateState;
  need: string;
  /** For each question of the paper, in order: how many of its parts have an answer. */
  answeredParts: number[];
  endsAt: number | null;
  secondsLeft: number;
  secondsAllowed: number;
  restSecondsLeft: number;
  heardAt: number | null;
  startedAt: number | null;
  endedAt: number | null;
  hasDevice: boolean;
  declared: boolean;
  helpCalled: boolean;
  incidents: number;
  claims: number;
};

/** What a proctor sees of a sitting at one moment. No answer, no key, no mark. */
export type BoardSnapshot = {
  now: number;
  /** The sitting's counter: a later snapshot never has a lower one. */
  number: number;
  mayRun: boolean;
  sitting: {
    id: string;
    title: string;
    room: string;
    className: string;
    state: SittingState;
    papers: string;
    opensAt: number;
    startsAt: number;
    latestStartAt: number;
    minutes: number;
    startedAt: number | null;
    pausedAt: number | null;
    closedAt: number | null;
    /** The school's zone as the server has it [min east of UTC]: a browser's own table of zones may be older or newer. */
    zoneOffset: number;
    locale: string;
  };
  proctors: string[];
  candidatesPerProctor: number;
  /** How many parts each question of the form has, in order. */
  partsOfQuestion: number[];
  seats: BoardSeat[];
};

export type TimelineEntry = { number: number; at: number; kind: string; actor: string | null; data: Record<string, string | number | boolean | null>; words: string | null };
