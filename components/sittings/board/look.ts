import { clockText } from '@/components/ui/clock-text';
import type { StateOf } from '@/components/ui/states';
import { type BoardSeat, type BoardSnapshot, contactLostAfter } from '@/lib/sittings/board-model';

/** What wants a look at one seat, or null. A candidate who works and was not heard of for a while has lost contact. */
export function signalOf(seat: BoardSeat, now: number): StateOf<'signal'> | null {
  if (seat.helpCalled) return 'help called';
  const sits = seat.state === 'writing' || seat.state === 'paused';
  if (sits && (seat.heardAt === null || now - seat.heardAt > contactLostAfter * 1000)) return 'lost contact';
  return null;
}

/** Seconds left at `now`; while the clock runs it goes on between two snapshots. */
export const leftAt = (seat: BoardSeat, now: number): number => (seat.endsAt === null ? seat.secondsLeft : Math.max(0, (seat.endsAt - now) / 1000));

/** What stands at the foot of a seat: time left, "stopped", or when it ended. */
export function leftText(seat: BoardSeat, now: number, time: (at: number) => string): string {
  if (seat.endedAt !== null) return time(seat.endedAt);
  if (seat.state === 'writing') return clockText(leftAt(seat, now));
  if (seat.state === 'paused' || seat.state === 'on rest break') return `${clockText(seat.secondsLeft)} kept`;
  return clockText(seat.secondsAllowed);
}

/** Questions with every part answered, of all. */
export const progressOf = (seat: BoardSeat, board: BoardSnapshot) => ({
  answered: board.partsOfQuestion.filter((parts, place) => parts > 0 && (seat.answeredParts[place] ?? 0) >= parts).length,
  of: board.partsOfQuestion.length,
});

const rowOf = (seat: string): string => /^[A-Za-z]*/.exec(seat)?.[0].toUpperCase() ?? '';
const placeOf = (seat: string): number => Number(/\d+/.exec(seat)?.[0] ?? 0);

/** Seats in the order of the room: row, then place; who has no seat comes last, by name. The order never follows the state. */
export const inRoomOrder = (seats: readonly BoardSeat[]): BoardSeat[] =>
  [...seats].sort((a, b) => Number(a.seat === '') - Number(b.seat === '') || rowOf(a.seat).localeCompare(rowOf(b.seat)) || placeOf(a.seat) - placeOf(b.seat) || a.name.localeCompare(b.name));

const said: Record<string, string> = {
  'open-check-in': 'Check-in opened', start: 'Sitting started', pause: 'Everybody paused', resume: 'Everybody resumed', close: 'Sitting closed',
  reconcile: 'Reconciled and signed', abandon: 'Sitting abandoned', cancel: 'Sitting cancelled', admitted: 'Admitted', refused: 'Turned away', started: 'Clock started', paused: 'Paused', resumed: 'Resumed',
  'rest-began': 'Rest break began', 'rest-ended': 'Rest break ended', 'time-added': 'Time added', withdrawn: 'Withdrawn', reopened: 'Reopened', transferred: 'Seat freed for another device',
  'seat-taken': 'Device took the seat', declared: 'Agreed to the declaration', 'handed-in': 'Handed in', 'timed-out': 'Time over', 'help-called': 'Called the proctor', 'help-answered': 'Call answered', incident: 'Incident noted',
};

/** A time line entry in words. */
export function eventInWords(kind: string, data: Record<string, unknown>): string {
  const minutes = typeof data.minutes === 'number' ? `, ${data.minutes} min` : '';
  return `${said[kind] ?? kind.replaceAll('-', ' ')}${minutes}`;
}
