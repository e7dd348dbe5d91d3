import type { Kysely } from 'kysely';
import type { DB } from '@/db/types';
import { blockDigest, commitmentOf, noteDigestOf } from './model';

export type AuditFault = { where: 'event' | 'note' | 'block'; id: number; says: string };

/** The head of the chain: what signed reports carry and what leaves the machine. Null before the first block. */
export async function chainHead(db: Kysely<DB>): Promise<{ number: number; digest: string } | null> {
  const head = await db.selectFrom('event_block').select(['number', 'digest']).orderBy('number', 'desc').limit(1).executeTakeFirst();
  return head ? { number: head.number, digest: head.digest.toString('hex') } : null;
}

/** Recomputes every commitment and every block; names each row that does not fit. */
export async function verifyLog(db: Kysely<DB>): Promise<AuditFault[]> {
  const faults: AuditFault[] = [];
  const notes = new Map((await db.selectFrom('event_note').selectAll().execute()).map((row) => [row.event_id, row.note]));
  const events = await db
    .selectFrom('event')
    .leftJoin('event_sealed', 'event_sealed.event_id', 'event.id')
    .select(['id', 'actor_id', 'kind', 'subject', 'subject_id', 'data', 'note_digest', 'salt', 'commitment', 'block_number', 'place'])
    .orderBy('id')
    .execute();
  const byBlock = new Map<number, { place: number; commitment: Buffer }[]>();
  for (const event of events) {
    const facts = { actorId: event.actor_id, kind: event.kind, subject: event.subject, subjectId: event.subject_id, data: event.data, noteDigest: event.note_digest };
    if (!commitmentOf(event.salt, facts).equals(event.commitment)) faults.push({ where: 'event', id: event.id, says: `Event ${event.id} (${event.kind}) is not as it was written.` });
    const note = notes.get(event.id);
    if (note !== undefined && !(event.note_digest && noteDigestOf(event.salt, note).equals(event.note_digest))) {
      faults.push({ where: 'note', id: event.id, says: `The words of event ${event.id} are not as they were written.` });
    }
    if (event.block_number === null || event.place === null) continue;
    const block = byBlock.get(event.block_number) ?? [];
    block.push({ place: event.place, commitment: event.commitment });
    byBlock.set(event.block_number, block);
  }
  let previous: Buffer = Buffer.alloc(32);
  for (const block of await db.selectFrom('event_block').selectAll().orderBy('number').execute()) {
    const inside = (byBlock.get(block.number) ?? []).sort((a, b) => a.place - b.place);
    const fits = inside.length === block.events && block.previous.equals(previous)
      && blockDigest(previous, block.number, inside.map((event) => event.commitment)).equals(block.digest);
    if (!fits) faults.push({ where: 'block', id: block.number, says: `Block ${block.number} does not follow from its events and the block before it.` });
    previous = block.digest;
  }
  return faults;
}
