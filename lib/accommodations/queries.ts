import type { Context } from '@/lib/context';
import { isId } from '@/lib/ids';
import { mayManagePeople } from '@/lib/people/policy';
import { done, notFound, type Result } from '@/lib/result';
import { type AccommodationRow, needInWords } from './model';

/** A person's accommodations with their reasons, the newest first, those that ended too. A registrar's. */
export async function listAccommodations(context: Context, accountId: string): Promise<Result<AccommodationRow[]>> {
  if (!mayManagePeople(context.actor) || !isId(accountId)) return notFound();
  const rows = await context.db
    .selectFrom('accommodation')
    .innerJoin('account as giver', 'giver.id', 'accommodation.given_by')
    .where('account_id', '=', accountId)
    .select(['accommodation.id', 'extra_percent', 'extra_minutes', 'rest_minutes', 'large_print', 'separate_room', 'reason', 'since', 'until'])
    .select(['giver.name as given_by', 'given_at', 'ended_at'])
    .orderBy('given_at', 'desc')
    .execute();
  return done(
    rows.map((row) => ({
      id: row.id,
      need: needInWords({
        extraPercent: Number(row.extra_percent),
        extraMinutes: row.extra_minutes,
        restMinutes: row.rest_minutes,
        largePrint: row.large_print,
        separateRoom: row.separate_room,
      }),
      reason: row.reason,
      since: row.since,
      until: row.until,
      givenBy: row.given_by,
      givenAt: row.given_at,
      endedAt: row.ended_at,
    })),
  );
}
