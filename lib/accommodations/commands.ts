import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { type Context, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { mayManagePeople } from '@/lib/people/policy';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { type AccommodationInput, accommodationSchema } from './model';

/** Stores one accommodation, within a transaction whose caller has checked actor and input. */
export async function insertAccommodation(context: LockingContext, accountId: string, givenBy: string, input: AccommodationInput): Promise<string> {
  const { id } = await context.db
    .insertInto('accommodation')
    .values({
      account_id: accountId,
      extra_percent: input.extraPercent,
      extra_minutes: input.extraMinutes,
      rest_minutes: input.restMinutes,
      large_print: input.largePrint,
      separate_room: input.separateRoom,
      reason: input.reason.trim(),
      since: input.since,
      until: input.until || null,
      given_by: givenBy,
    })
    .returning('id')
    .executeTakeFirstOrThrow();
  await record(context, { kind: 'accommodation.given', subject: 'account', subjectId: accountId, data: { accommodation: id } });
  return id;
}

/** Gives a person an accommodation from a day on. Refused: `not-found`, `invalid`. Candidates already planned take it over on the sitting's page. */
export async function giveAccommodation(context: Context, accountId: string, input: AccommodationInput): Promise<Result<{ id: string }>> {
  const { actor } = context;
  if (!mayManagePeople(actor) || actor.kind !== 'account' || !isId(accountId)) return notFound();
  const read = accommodationSchema.safeParse(input);
  if (!read.success) return refuse('invalid', read.error.issues[0]?.message ?? 'This cannot be read.', read.error.issues[0]?.path.map(String).join('.'));
  return inTransaction(context, async (locked) => {
    const account = await locked.db.selectFrom('account').where('id', '=', accountId).select('state').executeTakeFirst();
    if (!account) return notFound();
    return done({ id: await insertAccommodation(locked, accountId, actor.id, read.data) });
  });
}

/** Ends an accommodation now; it stays on record. */
export async function endAccommodation(context: Context, id: string): Promise<Result<null>> {
  if (!mayManagePeople(context.actor) || !isId(id)) return notFound();
  return inTransaction(context, async (locked) => {
    const row = await locked.db
      .updateTable('accommodation')
      .set({ ended_at: sql`app.now()` })
      .where('id', '=', id)
      .where('ended_at', 'is', null)
      .returning('account_id')
      .executeTakeFirst();
    if (!row) return notFound();
    await record(locked, { kind: 'accommodation.ended', subject: 'account', subjectId: row.account_id, data: { accommodation: id } });
    return done(null);
  });
}
