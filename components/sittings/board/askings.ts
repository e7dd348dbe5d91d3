import type { BoardSeat, BoardSnapshot } from '@/lib/sittings/board-model';
import type { Asking } from './ActionDialog';

const many = (count: number): string => `${count} ${count === 1 ? 'candidate' : 'candidates'}`;
const countOf = (board: BoardSnapshot, ...states: BoardSeat['state'][]): number => board.seats.filter((seat) => states.includes(seat.state)).length;

/** Questions about the whole sitting. */
export const sittingAskings = {
  start: (board: BoardSnapshot): Asking => ({
    title: `Start the sitting for ${many(countOf(board, 'admitted'))}?`,
    says: `Their clocks run from now, ${board.sitting.minutes} minutes each and more where it is allowed. ${countOf(board, 'expected') > 0 ? `${many(countOf(board, 'expected'))} not here yet can be admitted and started later.` : ''}`,
    verb: 'Start', look: 'main', action: () => ({ do: 'start' }),
  }),
  pause: (board: BoardSnapshot): Asking => ({
    title: `Pause all ${many(countOf(board, 'writing'))}?`,
    says: 'Every screen goes blank and every clock stands until you resume. Time left is kept to the second.',
    verb: 'Pause all', look: 'stop', words: { label: 'Reason', help: 'Such as: fire alarm.' }, action: ({ words }) => ({ do: 'pause', reason: words }),
  }),
  close: (board: BoardSnapshot): Asking => ({
    title: 'Close the sitting?',
    says: `${many(countOf(board, 'writing', 'paused', 'on rest break'))} still at work ${countOf(board, 'writing', 'paused', 'on rest break') === 1 ? 'is' : 'are'} handed in as of now; ${many(countOf(board, 'expected'))} not seen ${countOf(board, 'expected') === 1 ? 'becomes' : 'become'} absent. A closed sitting is not opened again.`,
    verb: 'Close the sitting', look: 'stop', action: () => ({ do: 'close' }),
  }),
  reconcile: (board: BoardSnapshot): Asking => {
    const absent = countOf(board, 'absent');
    const refused = countOf(board, 'refused');
    return {
      title: 'Sign the register?',
      says: `On the roster ${board.seats.length}; present ${board.seats.length - absent - refused}, absent ${absent}, turned away ${refused}. You sign that this is so.`,
      verb: 'Sign', look: 'main', action: () => ({ do: 'reconcile' }),
    };
  },
  incident: (): Asking => ({
    title: 'Note an incident in the room', says: 'What you write is kept for good with the time and your name. It is a record, not a finding.',
    verb: 'Note it', words: { label: 'What happened' }, action: ({ words }) => ({ do: 'incident', candidate: null, words }),
  }),
};

/** Questions about one candidate. */
export const seatAskings = {
  refuse: (seat: BoardSeat): Asking => ({
    title: `Turn ${seat.name} away?`, says: 'The candidate takes no part unless you admit them later.', verb: 'Turn away', look: 'stop', words: { label: 'Reason' },
    action: ({ words }) => ({ do: 'refuse', candidate: seat.candidateId, reason: words }),
  }),
  startLate: (seat: BoardSeat): Asking => ({
    title: `Start ${seat.name}?`, says: 'The clock runs from now. Leave the minutes as they are for the full time, or cut them and say why.', verb: 'Start',
    minutes: { label: 'Time for this candidate', initial: Math.round(seat.secondsAllowed / 60) }, words: { label: 'Reason, if it is cut', optional: true },
    action: ({ minutes, words }) => ({ do: 'start-late', candidates: [seat.candidateId], minutes: minutes === Math.round(seat.secondsAllowed / 60) ? null : minutes, reason: words }),
  }),
  pause: (seat: BoardSeat): Asking => ({
    title: `Pause ${seat.name}?`, says: 'The screen goes blank and the clock stands until you resume.', verb: 'Pause', words: { label: 'Reason' },
    action: ({ words }) => ({ do: 'pause-one', candidate: seat.candidateId, reason: words }),
  }),
  addTime: (seat: BoardSeat): Asking => ({
    title: `Give ${seat.name} more time`, says: 'The end of this candidate moves; nobody else’s does.', verb: 'Add the time', minutes: { label: 'Minutes to add', initial: 5 }, words: { label: 'Reason' },
    action: ({ minutes, words }) => ({ do: 'add-time', candidates: [seat.candidateId], minutes, reason: words }),
  }),
  incident: (seat: BoardSeat): Asking => ({
    title: `Note an incident about ${seat.name}`, says: 'What you write is kept for good with the time and your name. It is a record, not a finding.', verb: 'Note it', words: { label: 'What happened' },
    action: ({ words }) => ({ do: 'incident', candidate: seat.candidateId, words }),
  }),
  transfer: (seat: BoardSeat): Asking => ({
    title: `Move ${seat.name} to another device?`, says: 'The device used so far shows nothing more and can save nothing. The next device on which the candidate signs in takes the seat, with everything that is on the server.', verb: 'Free the seat', look: 'stop', words: { label: 'Reason' },
    action: ({ words }) => ({ do: 'transfer', candidate: seat.candidateId, reason: words }),
  }),
  withdraw: (seat: BoardSeat): Asking => ({
    title: `Withdraw ${seat.name}?`, says: 'The candidate’s sitting ends now; the paper so far is kept. This is not undone.', verb: 'Withdraw', look: 'stop', words: { label: 'Reason' },
    action: ({ words }) => ({ do: 'withdraw', candidate: seat.candidateId, reason: words }),
  }),
  reopen: (seat: BoardSeat): Asking => ({
    title: `Let ${seat.name} write on?`, says: 'The paper opens again for the minutes you give.', verb: 'Reopen', minutes: { label: 'Minutes to work', initial: 10 }, words: { label: 'Reason' },
    action: ({ minutes, words }) => ({ do: 'reopen', candidate: seat.candidateId, minutes, reason: words }),
  }),
};
