import { sql } from 'kysely';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { addTime, admit, beginRest, endRest, startCandidates, transfer, withdraw } from '@/lib/candidates/commands';
import { handIn, takeSeat } from '@/lib/candidates/seat-commands';
import { readPaper, readRoomState } from '@/lib/candidates/seat-queries';
import { saveResponses } from '@/lib/candidates/save';
import type { Seat } from '@/lib/candidates/seat-token';
import { readBoard } from '@/lib/sittings/board-queries';
import { closeSitting, pauseSitting, recordEnds, resumeSitting, startSitting } from '@/lib/sittings/commands';
import { openTestDatabase, type TestDatabase } from '../support/database';
import { makeAccount, makeRoom, type RoomFixture } from '../support/room';

let database: TestDatabase;
beforeAll(async () => { database = await openTestDatabase(); });
afterAll(async () => { await database.close(); });

const revision = (sequence: number, answer: string, part = 'a', question = 1) => ({ question, part, sequence, answer, typedAt: 0 });

async function seatOf(room: RoomFixture, place = 0): Promise<Seat> {
  const candidate = room.candidates[place];
  if (!candidate) throw new Error('No such place.');
  const taken = await takeSeat(candidate.context, room.sittingId, `device-${place}-0123456789`);
  if (!taken.ok || !taken.value) throw new Error('No seat.');
  return taken.value;
}

async function runningRoom(count: number): Promise<{ room: RoomFixture; seats: Seat[] }> {
  const room = await makeRoom(database.owner, database.app, count);
  const admitted = await admit(room.proctor, room.sittingId, room.candidates.map((candidate) => candidate.id));
  expect(admitted).toMatchObject({ ok: true, value: { refused: [] } });
  const seats = [];
  for (let place = 0; place < count; place += 1) seats.push(await seatOf(room, place));
  expect(await startSitting(room.proctor, room.sittingId)).toEqual({ ok: true, value: { state: 'running' } });
  return { room, seats };
}

const stored = (seat: Seat) => database.owner.selectFrom('response').select(['part', 'sequence', 'answer']).where('candidate_id', '=', seat.candidateId).orderBy('sequence').execute();
const stateOf = async (seat: Seat) => (await database.owner.selectFrom('candidate').selectAll().where('id', '=', seat.candidateId).executeTakeFirstOrThrow());

describe('saving', () => {
  it('acknowledges what it stored, once, and the same again without storing it twice', async () => {
    const { seats: [seat] } = await runningRoom(1);
    const first = await saveResponses(database.candidate, seat!, [revision(1, '60 A'), revision(2, '60.5 A')]);
    expect(first).toMatchObject({ ok: true });
    const again = await saveResponses(database.candidate, seat!, [revision(2, '60.5 A'), revision(3, '61 A')]);
    expect(again.ok && again.saved.map((row) => row.sequence).sort()).toEqual([2, 3]);
    expect((await stored(seat!)).map((row) => row.answer)).toEqual(['60 A', '60.5 A', '61 A']);
  });

  it('does not acknowledge another text under a sequence that is taken', async () => {
    const { seats: [seat] } = await runningRoom(1);
    await saveResponses(database.candidate, seat!, [revision(1, '60 A')]);
    const other = await saveResponses(database.candidate, seat!, [revision(1, '99 A')]);
    expect(other).toMatchObject({ ok: true, saved: [] });
    expect((await stored(seat!)).map((row) => row.answer)).toEqual(['60 A']);
  });

  it('ends at the stated end although nobody wrote it down, and keeps what comes within the grace as a claim', async () => {
    const { room, seats: [seat] } = await runningRoom(1);
    await saveResponses(database.candidate, seat!, [revision(1, 'before')]);
    await database.setClock('2 hours 5 seconds');
    const late = await saveResponses(database.candidate, seat!, [revision(1, 'before'), revision(2, 'late')]);
    expect(late).toMatchObject({ ok: false, code: 'ended' });
    expect(!late.ok && late.claimed.map((row) => row.sequence).sort()).toEqual([1, 2]);
    expect(await database.owner.selectFrom('claim').select('answer').where('candidate_id', '=', seat!.candidateId).execute()).toEqual([{ answer: 'late' }]);
    expect(await recordEnds({ db: database.app, actor: { kind: 'system', name: 'worker' } })).toBeGreaterThanOrEqual(1);
    const row = await stateOf(seat!);
    expect(row.state).toBe('timed out');
    expect(row.ended_at!.getTime() - row.started_at!.getTime()).toBe(7_200_000);
    await database.setClock('10 minutes');
    expect(await saveResponses(database.candidate, seat!, [revision(3, 'much later')])).toMatchObject({ ok: false, code: 'ended', claimed: [] });
    expect((await readBoard(room.proctor, room.sittingId)).ok).toBe(true);
  });

  it('stores no save after a hand-in, whatever arrives at the same moment', async () => {
    const { room, seats } = await runningRoom(6);
    await Promise.all(seats.map(async (seat, place) => {
      const saves = Array.from({ length: 8 }, (_, at) => saveResponses(database.candidate, seat, [revision(at + 1, `${at}`)]));
      const handed = handIn(room.candidates[place]!.context, seat);
      const outcomes = await Promise.all([...saves, handed.then(() => undefined)]);
      const acknowledged = outcomes.flatMap((outcome) => (outcome && outcome.ok ? outcome.saved.map((row) => row.sequence) : []));
      expect((await stored(seat)).map((row) => row.sequence)).toEqual([...new Set(acknowledged)].sort((a, b) => a - b));
      const { ended_at: ended } = await stateOf(seat);
      const { last } = await database.owner.selectFrom('response').select((eb) => eb.fn.max('at').as('last')).where('candidate_id', '=', seat.candidateId).executeTakeFirstOrThrow();
      expect(last === null || last <= ended!).toBe(true);
    }));
  });

  it('takes nothing from a device whose seat was moved, nor from a withdrawn candidate', async () => {
    const { room, seats: [seat, second] } = await runningRoom(2);
    await transfer(room.proctor, room.sittingId, seat!.candidateId, 'tablet died');
    expect(await saveResponses(database.candidate, seat!, [revision(1, 'old device')])).toMatchObject({ ok: false, code: 'other-device' });
    expect((await readRoomState(database.candidate, seat!)).ok).toBe(false);
    const moved = await takeSeat(room.candidates[0]!.context, room.sittingId, 'another-device-0123456789');
    expect(moved).toMatchObject({ ok: true, value: { epoch: 2 } });
    await withdraw(room.proctor, room.sittingId, second!.candidateId, 'left ill');
    expect(await saveResponses(database.candidate, second!, [revision(1, 'x')])).toMatchObject({ ok: false });
  });

  it('gives the candidate no way to a key', async () => {
    const { seats: [seat] } = await runningRoom(1);
    await expect(database.candidate.selectFrom('paper_key').select('draw').execute()).rejects.toThrow(/permission denied/);
    await expect(sql`select secret from sitting`.execute(database.candidate)).rejects.toThrow(/permission denied/);
    await expect(sql`select note from candidate`.execute(database.candidate)).rejects.toThrow(/permission denied/);
    expect(await readPaper(database.candidate, seat!)).toMatchObject({ ok: true });
  });
});

describe('the room', () => {
  it('keeps the time left through a pause to the millisecond, and moves only the ends it should', async () => {
    const { room, seats: [seat, other] } = await runningRoom(2);
    await addTime(room.proctor, room.sittingId, [other!.candidateId], 30, 'accommodation');
    await database.setClock('10 minutes');
    await pauseSitting(room.proctor, room.sittingId, 'alarm');
    const paused = await stateOf(seat!);
    const left = paused.seconds_left!;
    expect(left).toBeLessThanOrEqual(6600);
    expect(left).toBeGreaterThan(6590);
    expect(await saveResponses(database.candidate, seat!, [revision(1, 'x')])).toMatchObject({ ok: false, code: 'stopped' });
    await database.setClock('3 hours');
    await resumeSitting(room.proctor, room.sittingId);
    const state = await readRoomState(database.candidate, seat!);
    expect(state.ok && Math.abs(state.value.endsAt! - state.value.now - left * 1000)).toBeLessThan(1000);
    expect((await stateOf(other!)).ends_at!.getTime() - (await stateOf(seat!)).ends_at!.getTime()).toBe(1_800_000);
  });

  it('lets a rest break stand up to its cap and takes the rest from the working time', async () => {
    const { room, seats: [seat] } = await runningRoom(1);
    await database.owner.updateTable('candidate').set({ rest_seconds_allowed: 600 }).where('id', '=', seat!.candidateId).execute();
    await beginRest(room.proctor, room.sittingId, seat!.candidateId);
    const before = (await stateOf(seat!)).seconds_left!;
    await database.setClock('15 minutes');
    await endRest(room.proctor, room.sittingId, seat!.candidateId);
    const state = await readRoomState(database.candidate, seat!);
    expect(state.ok && Math.abs(state.value.secondsLeft! - (before - 300))).toBeLessThan(2);
    expect(await beginRest(room.proctor, room.sittingId, seat!.candidateId)).toMatchObject({ value: { refused: [{ code: 'no-rest-left' }] } });
  });

  it('starts a late candidate with the full time or with a cut one, with its reason', async () => {
    const { room } = await runningRoom(1);
    const late = await makeRoom(database.owner, database.app, 2);
    await admit(late.proctor, late.sittingId, [late.candidates[0]!.id]);
    await startSitting(late.proctor, late.sittingId);
    await admit(late.proctor, late.sittingId, [late.candidates[1]!.id]);
    expect(await startCandidates(late.proctor, late.sittingId, [late.candidates[1]!.id], { minutes: 90 })).toMatchObject({ ok: false, code: 'no-reason' });
    expect(await startCandidates(late.proctor, late.sittingId, [late.candidates[1]!.id], { minutes: 90, reason: 'bus' })).toMatchObject({ ok: true });
    const row = await database.owner.selectFrom('candidate').selectAll().where('id', '=', late.candidates[1]!.id).executeTakeFirstOrThrow();
    expect(row.ends_at!.getTime() - row.started_at!.getTime()).toBe(5_400_000);
    expect(room.sittingId).not.toBe(late.sittingId);
  });

  it('shows a stranger nothing and lets nobody act but an assigned proctor', async () => {
    const { room, seats: [seat] } = await runningRoom(1);
    const stranger = await makeAccount(database.owner, database.app, 'Other Proctor', 'proctor');
    for (const actor of [stranger, room.instructor, room.candidates[0]!.context]) {
      expect(await pauseSitting(actor, room.sittingId, 'x')).toMatchObject({ ok: false, code: 'not-found' });
      expect(await withdraw(actor, room.sittingId, seat!.candidateId, 'x')).toMatchObject({ ok: false, code: 'not-found' });
    }
    expect(await readBoard(stranger, room.sittingId)).toMatchObject({ ok: false, code: 'not-found' });
    expect(await readBoard(stranger, 'not-an-id')).toMatchObject({ ok: false, code: 'not-found' });
    expect(await takeSeat(stranger, room.sittingId, 'some-device-0123456789')).toMatchObject({ ok: false, code: 'not-found' });
  });

  it('closes with every candidate in an end state and numbers its time line without a gap', async () => {
    const { room, seats: [seat] } = await runningRoom(2);
    await saveResponses(database.candidate, seat!, [revision(1, '60 A'), revision(2, '1 V', 'b'), revision(3, '')]);
    const board = await readBoard(room.proctor, room.sittingId);
    expect(board.ok && board.value.seats.find((row) => row.candidateId === seat!.candidateId)?.answeredParts).toEqual([1, 0]);
    expect(await closeSitting(room.proctor, room.sittingId)).toMatchObject({ ok: true, value: { state: 'closed' } });
    const states = await database.owner.selectFrom('candidate').select('state').where('sitting_id', '=', room.sittingId).execute();
    expect(states.map((row) => row.state)).toEqual(['handed in', 'handed in']);
    const numbers = await database.owner.selectFrom('sitting_event').select('number').where('sitting_id', '=', room.sittingId).orderBy('number').execute();
    expect(numbers.map((row) => row.number)).toEqual(numbers.map((_, place) => place + 1));
  });
});
