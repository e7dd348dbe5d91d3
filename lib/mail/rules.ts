import type { MailState } from './model';

/** What happened to a message at one attempt. */
export type MailEvent =
  | { event: 'begin' }
  | { event: 'taken' }
  /** The server refused for good. */
  | { event: 'refused' }
  /** Nothing was handed over: no connection, or a temporary refusal. */
  | { event: 'not now' }
  /** Cut off after the message was on its way, or the program stopped while sending. */
  | { event: 'cut off' }
  /** A person asks to send it again, knowing that it may arrive twice. */
  | { event: 'ask again' };

export type MailStep = { ok: true; state: MailState; retryAfterSeconds?: number } | { ok: false; code: 'not-in-this-state' };

/** Pauses before the next attempt, in seconds: a minute at first, half a day at last. Then the message has failed. */
export const retryPauses = [60, 300, 900, 3600, 10_800, 43_200] as const;

/**
 * The next state of a message. `attempts` counts those begun, the present one included.
 * Nothing is ever sent again by itself out of `unsure`: SMTP cannot promise exactly once.
 */
export function nextMailState(state: MailState, happened: MailEvent, attempts: number): MailStep {
  const refused: MailStep = { ok: false, code: 'not-in-this-state' };
  if (happened.event === 'begin') return state === 'queued' ? { ok: true, state: 'sending' } : refused;
  if (happened.event === 'ask again') return state === 'failed' || state === 'unsure' ? { ok: true, state: 'queued' } : refused;
  if (state !== 'sending') return refused;
  if (happened.event === 'taken') return { ok: true, state: 'accepted' };
  if (happened.event === 'refused') return { ok: true, state: 'failed' };
  if (happened.event === 'cut off') return { ok: true, state: 'unsure' };
  const pause = retryPauses[attempts - 1];
  return pause === undefined ? { ok: true, state: 'failed' } : { ok: true, state: 'queued', retryAfterSeconds: pause };
}
