import { readClock } from '@/db/clock';
import { record } from '@/lib/audit/commands';
import { publicLink } from '@/lib/config';
import type { Context } from '@/lib/context';
import { queueMail } from '@/lib/mail/commands';
import { done, type Result } from '@/lib/result';
import type { School } from '@/lib/school/model';
import { readSchool } from '@/lib/school/queries';
import { showAppointment, showTime } from '@/lib/school/times';
import { calendarEntry } from './calendar';
import { type PlannedSitting, type Planner, withPlanned } from './store';

type Invited = { id: string; account_id: string; email: string; name: string; seat: string; seconds_allowed: number };

function bodyOf(sitting: PlannedSitting, school: School, candidate: Invited): string {
  const { settings } = school;
  const lines = [
    `${candidate.name},`, '',
    `you are a candidate in this sitting at ${school.name}:`, '',
    `  ${sitting.title}`,
    `  ${showAppointment(sitting.starts_at, settings)}`,
    `  Room ${sitting.room}${candidate.seat ? `, seat ${candidate.seat}` : ''}`,
    `  Check-in opens at ${showTime(sitting.opens_at, settings)}; the latest start is ${showTime(sitting.latest_start_at, settings)}.`, '',
    'Bring something that shows who you are. What you may have on the bench, and a rehearsal on a dummy paper, are here:',
    publicLink('/today'),
    ...(settings.helpAddress ? ['', `Questions: ${settings.helpAddress}`] : []),
  ];
  return lines.join('\n');
}

async function invite(planner: Planner, sitting: PlannedSitting, school: School, candidate: Invited, madeAt: Date): Promise<boolean> {
  const entry = calendarEntry({
    uid: `${candidate.id}@fullfield`, title: sitting.title, room: sitting.room, opensAt: sitting.opens_at, startsAt: sitting.starts_at,
    endsAt: new Date(sitting.starts_at.getTime() + candidate.seconds_allowed * 1000), madeAt, link: publicLink('/today'),
  });
  const queued = await queueMail(planner.db, {
    kind: 'sitting', to: candidate.email, subject: `Sitting: ${sitting.title}`, body: bodyOf(sitting, school, candidate),
    attach: [{ name: 'sitting.ics', type: 'text/calendar; charset=utf-8; method=PUBLISH', text: entry }],
    accountId: candidate.account_id, sittingId: sitting.id, madeBy: planner.me,
    // A changed time, room or seat is another message; the same plan is mailed once.
    once: `sitting ${candidate.id} ${sitting.starts_at.toISOString()} ${sitting.opens_at.toISOString()} ${sitting.room} ${candidate.seat}`,
  });
  return queued.ok;
}

/**
 * Invites the candidates who have an address, by e-mail with a calendar entry. No mark, key or secret stands in it. Whoever was
 * told this plan before is not told again; the others without an address get printed slips.
 */
export async function inviteCandidates(context: Context, sittingId: string): Promise<Result<{ queued: number; before: number; withoutAddress: number }>> {
  return withPlanned(context, sittingId, async (planner, sitting) => {
    const school = await readSchool(planner.db);
    const madeAt = await readClock(planner.db);
    const rows = await planner.db
      .selectFrom('candidate as c').innerJoin('account as a', 'a.id', 'c.account_id').where('c.sitting_id', '=', sitting.id).where('a.state', '<>', 'closed')
      .select(['c.id', 'c.account_id', 'c.seat', 'c.seconds_allowed', 'a.email', 'a.name']).orderBy('a.sort_name').execute();
    let queued = 0;
    const reachable = rows.flatMap((row) => (row.email === null ? [] : [{ ...row, email: row.email }]));
    for (const candidate of reachable) if (await invite(planner, sitting, school, candidate, madeAt)) queued += 1;
    if (queued > 0) await record(planner, { kind: 'sitting.invited', subject: 'sitting', subjectId: sitting.id, data: { queued } });
    return done({ queued, before: reachable.length - queued, withoutAddress: rows.length - reachable.length });
  });
}
