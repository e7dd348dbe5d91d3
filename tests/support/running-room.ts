import type { Database } from '@/db/client';
import { admit } from '@/lib/candidates/commands';
import { takeSeat } from '@/lib/candidates/seat-commands';
import { type Seat, sealSeat } from '@/lib/candidates/seat-token';
import { startSitting } from '@/lib/sittings/commands';
import { makeRoom, type RoomFixture } from './room';

export type Seated = { candidateId: string; seat: Seat };

/** A sitting that runs, with `count` candidates who write, each at a device of their own. */
export async function makeRunningRoom(owner: Database, app: Database, count: number): Promise<{ room: RoomFixture; seated: Seated[] }> {
  const room = await makeRoom(owner, app, count);
  const admitted = await admit(room.proctor, room.sittingId, room.candidates.map((candidate) => candidate.id));
  if (!admitted.ok) throw new Error(admitted.says);
  const seated: Seated[] = [];
  for (const [place, { id, context }] of room.candidates.entries()) {
    const taken = await takeSeat(context, room.sittingId, `device-${place}-0123456789`);
    if (!taken.ok || !taken.value) throw new Error('An admitted candidate found no seat.');
    seated.push({ candidateId: id, seat: taken.value });
  }
  const started = await startSitting(room.proctor, room.sittingId);
  if (!started.ok) throw new Error(started.says);
  return { room, seated };
}

/** The cookie of a device that holds a seat. */
export const seatCookieOf = (seat: Seat, seatKey: string): string => `seat=${sealSeat(seat, seatKey)}`;
