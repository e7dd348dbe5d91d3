import { record } from '@/lib/audit/commands';
import type { Context } from '@/lib/context';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { localDay } from '@/lib/school/times';
import { type SeatList, seatList } from './model';
import { allowancesOn, enrolledOn } from './roster';
import { freeSeat } from './rules';
import { type Planner, queuePapers, timeColumns, withPlanned } from './store';

/** Seats of several candidates at once. A seat given twice is refused; an empty one is allowed until check-in. */
export async function setSeats(context: Context, sittingId: string, input: SeatList): Promise<Result<null>> {
  const wanted = new Map(seatList.parse(input).map((row) => [row.candidateId, row.seat]));
  return withPlanned(context, sittingId, async (planner, sitting) => {
    const rows = await planner.db.selectFrom('candidate').where('sitting_id', '=', sitting.id).select(['id', 'seat']).forUpdate().execute();
    const known = new Set(rows.map((row) => row.id));
    if ([...wanted.keys()].some((id) => !known.has(id))) return notFound();
    const after = rows.map((row) => wanted.get(row.id) ?? row.seat);
    const shared = after.find((seat, place) => seat !== '' && after.indexOf(seat) !== place);
    if (shared) return refuse('seat-taken', `Seat ${shared} is given twice: give one of them another seat.`);
    for (const [id, seat] of wanted) await planner.db.updateTable('candidate').set({ seat }).where('id', '=', id).execute();
    await record(planner, { kind: 'sitting.seats-set', subject: 'sitting', subjectId: sitting.id, data: { seats: wanted.size } });
    return done(null);
  });
}

/** Late enrolment: puts students of the class on the list of a planned sitting. Whoever is on it already is left as is. */
export async function addCandidates(context: Context, sittingId: string, accountIds: readonly string[]): Promise<Result<{ added: number }>> {
  return withPlanned(context, sittingId, async (planner, sitting) => {
    const { settings } = await readSchool(planner.db);
    const day = localDay(sitting.starts_at, settings);
    const wanted = new Set(accountIds);
    if (wanted.size === 0) return done({ added: 0 });
    const students = (await enrolledOn(planner, sitting.class_id, day)).filter((student) => wanted.has(student.accountId));
    if (students.length !== wanted.size) return refuse('not-enrolled', 'Only students enrolled in the class on the day of the sitting can be candidates.');
    const proctor = await planner.db.selectFrom('sitting_proctor').where('sitting_id', '=', sitting.id).where('account_id', 'in', [...wanted]).select('account_id').executeTakeFirst();
    if (proctor) return refuse('proctor-is-candidate', 'A proctor of this sitting cannot be its candidate.');
    const rows = await planner.db.selectFrom('candidate').where('sitting_id', '=', sitting.id).select(['account_id', 'seat']).execute();
    const on = new Set(rows.map((row) => row.account_id));
    const seats = new Set(rows.map((row) => row.seat));
    const allowances = await allowancesOn(planner, students.map((student) => student.accountId), day);
    const added = students.filter((student) => !on.has(student.accountId));
    for (const student of added) {
      const seat = freeSeat(seats);
      seats.add(seat);
      await planner.db
        .insertInto('candidate')
        .values({ sitting_id: sitting.id, account_id: student.accountId, seat, ...timeColumns(sitting.minutes, allowances.get(student.accountId)) })
        .execute();
    }
    if (added.length > 0) {
      await queuePapers(planner, sitting.id);
      await record(planner, { kind: 'sitting.candidates-added', subject: 'sitting', subjectId: sitting.id, data: { accounts: added.map((student) => student.accountId) } });
    }
    return done({ added: added.length });
  });
}

async function discard(planner: Planner, candidateId: string): Promise<void> {
  await planner.db.deleteFrom('paper_key').where('candidate_id', '=', candidateId).execute();
  await planner.db.deleteFrom('paper').where('candidate_id', '=', candidateId).execute();
  await planner.db.deleteFrom('candidate').where('id', '=', candidateId).execute();
}

/** Takes somebody off the list of a planned sitting, with a paper that nobody has seen. Put on again, they get another one. */
export async function removeCandidate(context: Context, sittingId: string, candidateId: string): Promise<Result<null>> {
  return withPlanned(context, sittingId, async (planner, sitting) => {
    const row = await planner.db
      .selectFrom('candidate').where('sitting_id', '=', sitting.id).where('id', '=', candidateId).select(['id', 'account_id', 'state']).forUpdate().executeTakeFirst();
    if (!row) return notFound();
    await discard(planner, row.id);
    await queuePapers(planner, sitting.id);
    await record(planner, { kind: 'sitting.candidate-removed', subject: 'sitting', subjectId: sitting.id, data: { candidate: row.id, account: row.account_id } });
    return done(null);
  });
}

/** Tries again after the papers could not be drawn. */
export async function drawPapersAgain(context: Context, sittingId: string): Promise<Result<null>> {
  return withPlanned(context, sittingId, async (planner, sitting) => {
    await queuePapers(planner, sitting.id);
    return done(null);
  });
}
