import { randomBytes } from 'node:crypto';
import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import { type Context, type LockingContext, accountId } from '@/lib/context';
import { blockDigest, commitmentOf, type EventInput, noteDigestOf } from './model';

/** Appends one event to the log, in the transaction of the change it tells of. */
export async function record(context: LockingContext, input: EventInput): Promise<void> {
  const salt = randomBytes(16);
  const actorId = accountId(context.actor);
  const data = { ...input.data, ...(context.actor.kind === 'system' ? { by: context.actor.name } : {}) };
  const noteDigest = input.note ? noteDigestOf(salt, input.note) : null;
  const commitment = commitmentOf(salt, { actorId, kind: input.kind, subject: input.subject, subjectId: input.subjectId, data, noteDigest });
  const { id } = await context.db
    .insertInto('event')
    .values({ actor_id: actorId, kind: input.kind, subject: input.subject, subject_id: input.subjectId, data: JSON.stringify(data), note_digest: noteDigest, salt, commitment })
    .returning('id')
    .executeTakeFirstOrThrow();
  if (input.note) await context.db.insertInto('event_note').values({ event_id: id, note: input.note }).execute();
}

const SEALING_LOCK = 7_301;
const MOST_IN_A_BLOCK = 5_000;

/**
 * Seals every committed event that stands in no block into the next block of the chain.
 * One sealer at a time by an advisory lock; another one finds nothing to do. Returns the number of events sealed.
 */
export async function sealEvents(db: Kysely<DB>): Promise<number> {
  return db.transaction().execute(async (trx) => {
    const lock = await sql<{ held: boolean }>`select pg_try_advisory_xact_lock(${SEALING_LOCK}) as held`.execute(trx);
    if (!lock.rows[0]?.held) return 0;
    const events = await trx
      .selectFrom('event')
      .leftJoin('event_sealed', 'event_sealed.event_id', 'event.id')
      .where('event_sealed.event_id', 'is', null)
      .select(['event.id', 'event.commitment'])
      .orderBy('event.id')
      .limit(MOST_IN_A_BLOCK)
      .execute();
    if (events.length === 0) return 0;
    const last = await trx.selectFrom('event_block').select(['number', 'digest']).orderBy('number', 'desc').limit(1).executeTakeFirst();
    const number = (last?.number ?? 0) + 1;
    const previous = last?.digest ?? Buffer.alloc(32);
    const digest = blockDigest(previous, number, events.map((event) => event.commitment));
    await trx.insertInto('event_block').values({ number, events: events.length, previous, digest }).execute();
    await trx
      .insertInto('event_sealed')
      .values(events.map((event, place) => ({ event_id: event.id, block_number: number, place })))
      .execute();
    return events.length;
  });
}

/** Erases the personal words of an event; the log keeps that there were some, and their digest. */
export async function eraseNote(context: Context, eventId: number): Promise<boolean> {
  if (context.actor.kind !== 'account' || !context.actor.roles.has('registrar')) return false;
  const gone = await context.db.deleteFrom('event_note').where('event_id', '=', eventId).executeTakeFirst();
  return gone.numDeletedRows > 0n;
}
