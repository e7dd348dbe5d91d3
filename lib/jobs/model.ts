/**
 * Every job by its name, with what it is told. A feature that has a job adds a line here and its handler in tasks.ts.
 * A payload holds ids only: what the job works on is read when it runs.
 */
export type JobPayloads = {
  'send-mail': { mailId: string };
  'send-reset-link': { accountId: string | null };
  'check-template': { checkId: string };
  'draw-papers': { sittingId: string };
  'mark-paper': { candidateId: string };
  'mark-sitting': { sittingId: string };
};

export type JobName = keyof JobPayloads;

export type JobOptions = {
  /** Idempotence key: a job that waits under the same key is replaced, so that one thing is never queued twice. */
  key?: string;
  /** Heavy jobs (drawing a class's papers, checks over thousands of draws, reports) run one after the other, whatever waits. */
  heavy?: boolean;
  /** Not before this moment of the database's clock. */
  runAt?: Date;
  /** Tries in all before it is given up; default 5, with growing pauses. */
  maxAttempts?: number;
  /** Lower goes first; default 0, heavy jobs 10. */
  priority?: number;
};
