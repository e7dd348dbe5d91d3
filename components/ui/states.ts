import type { ShapeName } from './Shape';
import type { Tone } from './Sign';

/** [shape, tone, the word where it differs from the state's name] */
type Look = readonly [ShapeName, Tone, string?];

/** The shape and colour of every state of every thing. The word is always printed. */
export const states = {
  template: {
    draft: ['sq-dashed', 'none'],
    'in review': ['sq-half', 'wait'],
    approved: ['check', 'ok'],
    retired: ['sq-strike', 'none'],
  },
  exam: {
    draft: ['sq-dashed', 'none'],
    'in review': ['sq-half', 'wait'],
    approved: ['check', 'ok'],
    retired: ['sq-strike', 'none'],
  },
  check: {
    'not checked': ['sq-dashed', 'none'],
    queued: ['hourglass', 'none'],
    running: ['half', 'ink'],
    'in order': ['check', 'ok'],
    problems: ['sq-bang', 'wait'],
    cancelled: ['cross', 'none'],
    failed: ['tri', 'stop'],
  },
  sitting: {
    planned: ['planned', 'none'],
    'check-in': ['in', 'info'],
    running: ['half', 'ok'],
    paused: ['bars', 'wait'],
    closed: ['sq', 'ink'],
    reconciled: ['check-ruled', 'ok'],
    cancelled: ['cross', 'none'],
    abandoned: ['break', 'stop'],
  },
  papers: {
    none: ['sq-dashed', 'none', 'not drawn'],
    drawing: ['hourglass', 'wait'],
    drawn: ['check', 'ok'],
    failed: ['tri', 'stop'],
  },
  candidate: {
    expected: ['ring-dashed', 'none'],
    admitted: ['ring-dot', 'info'],
    writing: ['half', 'ink'],
    paused: ['bars', 'wait'],
    'on rest break': ['cup', 'wait'],
    'handed in': ['check', 'ok'],
    'timed out': ['clock', 'ink'],
    withdrawn: ['door', 'none'],
    absent: ['slash', 'none'],
    refused: ['cross', 'stop'],
  },
  signal: {
    'lost contact': ['tri', 'stop'],
    'help called': ['speech', 'info'],
    'incident noted': ['sq-bang', 'wait'],
  },
  response: {
    blank: ['ring', 'none'],
    'in part': ['half', 'ink'],
    answered: ['disc', 'ok'],
    flagged: ['flag', 'wait'],
    saved: ['check', 'ok'],
    sending: ['hourglass', 'wait'],
    'kept here': ['sq-bang', 'wait'],
    'cannot be read': ['cross', 'stop'],
    paused: ['bars', 'wait'],
  },
  verdict: {
    correct: ['check', 'ok'],
    carried: ['turn', 'ok'],
    misstep: ['sq-bang', 'wait'],
    wrong: ['cross', 'stop'],
    blank: ['ring', 'none'],
    unread: ['sq-query', 'wait', 'not read'],
    'for-marker': ['tray', 'wait', 'for the marker'],
  },
  result: {
    provisional: ['sq-dashed', 'none'],
    moderated: ['sq-half', 'info'],
    released: ['sq-out', 'ok'],
    sealed: ['plate', 'ok'],
    amended: ['plates', 'info'],
    withheld: ['lock', 'wait'],
  },
  outcome: {
    pass: ['check', 'ok'],
    'not passed': ['cross', 'stop'],
    'second marker': ['sq-bang', 'wait'],
    withheld: ['lock', 'wait'],
    absent: ['slash', 'none'],
  },
  appeal: {
    received: ['tray', 'info'],
    'clerical check': ['rows', 'wait'],
    're-mark': ['turn', 'wait'],
    decided: ['check', 'ok'],
  },
  'e-mail': {
    queued: ['hourglass', 'none'],
    sending: ['up', 'info'],
    accepted: ['check', 'ok'],
    failed: ['tri', 'stop'],
    unsure: ['sq-query', 'wait'],
    delivered: ['check-two', 'ok'],
  },
  account: {
    invited: ['tray', 'info'],
    active: ['check', 'ok'],
    closed: ['door', 'none'],
  },
} satisfies Record<string, Record<string, Look>>;

export type Thing = keyof typeof states;
export type StateOf<T extends Thing> = keyof (typeof states)[T] & string;

/** The look of a state; a state that the table does not know is a bug. */
export function lookOf<T extends Thing>(thing: T, state: StateOf<T>): { shape: ShapeName; tone: Tone; word: string } {
  const look = (states[thing] as Record<string, Look>)[state];
  if (!look) throw new Error(`No look is kept for the state “${state}” of ${thing}.`);
  return { shape: look[0], tone: look[1], word: look[2] ?? state };
}
