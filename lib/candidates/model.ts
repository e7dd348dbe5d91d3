import { z } from 'zod';

export const candidateStates = [
  'expected', 'admitted', 'writing', 'paused', 'on rest break', 'handed in', 'timed out', 'withdrawn', 'absent', 'refused',
] as const;
export type CandidateState = (typeof candidateStates)[number];

/** States in which a candidate's paper may be worked on or will be again. */
export const seatedStates: readonly CandidateState[] = ['admitted', 'writing', 'paused', 'on rest break'];
export const endedStates: readonly CandidateState[] = ['handed in', 'timed out', 'withdrawn'];

/** What the rules look at and change. While the clock runs `endsAt` is set; while it stands `secondsLeft` is. Times are the database's. */
export type CandidateClock = {
  state: CandidateState;
  secondsAllowed: number;
  startedAt: Date | null;
  endsAt: Date | null;
  secondsLeft: number | null;
  restSecondsAllowed: number;
  restSecondsUsed: number;
  restBeganAt: Date | null;
  endedAt: Date | null;
};

export type CandidateEvent =
  | { kind: 'admit' }
  | { kind: 'refuse' }
  | { kind: 'mark-absent' }
  | { kind: 'start'; seconds?: number }
  | { kind: 'pause' }
  | { kind: 'resume' }
  | { kind: 'begin-rest' }
  | { kind: 'end-rest' }
  | { kind: 'add-time'; seconds: number }
  | { kind: 'hand-in' }
  | { kind: 'time-out' }
  | { kind: 'withdraw' }
  | { kind: 'reopen'; seconds: number };

const answerText = z.string().max(200);
/** One revision of one answer, as a browser sends it. The sequence counts up per candidate and device; the highest of a part counts. */
export const revision = z.object({
  question: z.number().int().min(1).max(200),
  part: z.string().regex(/^[a-z][a-z0-9_]{0,30}$/),
  sequence: z.number().int().min(1).max(Number.MAX_SAFE_INTEGER),
  answer: answerText,
  typedAt: z.number().int().nonnegative(),
});
export type Revision = z.infer<typeof revision>;

export const flagChange = z.object({
  question: z.number().int().min(1).max(200),
  sequence: z.number().int().min(1).max(Number.MAX_SAFE_INTEGER),
  flagged: z.boolean(),
});
export type FlagChange = z.infer<typeof flagChange>;

/** What the room shows of the candidate's own state. Times in milliseconds of the database's clock. */
export type RoomState = {
  candidateId: string;
  state: CandidateState;
  sittingState: string;
  epoch: number;
  now: number;
  endsAt: number | null;
  secondsLeft: number | null;
  secondsAllowed: number;
  startedAt: number | null;
  endedAt: number | null;
  seat: string;
  helpCalled: boolean;
  declared: boolean;
};

/** What the room shows before and beside the paper. */
export type RoomCover = {
  sittingId: string;
  title: string;
  room: string;
  candidateName: string;
  minutes: number;
  startsAt: number;
  /** The school's zone as the server has it [min east of UTC]: a browser's own table of zones may be older or newer. */
  zoneOffset: number;
  locale: string;
  /** The cover page of the paper: instructions as HTML of ours, the declaration, what may lie on the bench, the pass rule. */
  instructionsHtml: string;
  declaration: string;
  materials: string[];
  passRule: string[];
};

export type SaveOutcome =
  | { ok: true; now: number; saved: { question: number; part: string; sequence: number }[] }
  | { ok: false; code: 'ended' | 'other-device' | 'stopped' | 'not-found'; says: string; now: number; claimed: { question: number; part: string; sequence: number }[] };

/** One of a student's own sittings, as Today shows it. */
export type OwnSitting = {
  sittingId: string;
  candidateId: string;
  title: string;
  room: string;
  seat: string;
  sittingState: string;
  state: CandidateState;
  opensAt: Date;
  startsAt: Date;
  latestStartAt: Date;
  minutesAllowed: number;
  materials: string[];
  rehearsed: boolean;
  endedAt: Date | null;
};
