import { type Kysely, sql } from 'kysely';
import { candidateDb } from '@/db/client';
import type { DB } from '@/db/types';
import { channel } from './listener';

/** At most four a second for one sitting from one process: every NOTIFY takes a lock of the whole database at commit. */
const gap = 250;

type Pending = { last: number; timer: NodeJS.Timeout | undefined };
const shared = globalThis as typeof globalThis & { fullfieldPosts?: Map<string, Pending> };

/** A state changed: the sitting's or a candidate's. Candidates' streams and boards listen. */
export const sittingTopic = (sittingId: string): string => `sitting:${sittingId}`;
/** Answers were saved or candidates heard of. Boards alone listen, so that a save does not wake a whole room. */
export const savesTopic = (sittingId: string): string => `saves:${sittingId}`;

async function notify(topic: string): Promise<void> {
  // A lost message is made good by the streams' own reading anew.
  await sql`select pg_notify(${channel}, ${topic})`.execute(candidateDb()).catch(() => undefined);
}

/**
 * Tells every process that answers of the sitting were saved, soon and not too often. Call it after the commit;
 * it returns at once. Posts within the gap fall together into one at its end.
 */
export function postSaved(sittingId: string): void {
  const posts = (shared.fullfieldPosts ??= new Map<string, Pending>());
  const topic = savesTopic(sittingId);
  const now = performance.now();
  const pending = posts.get(topic) ?? { last: -gap, timer: undefined };
  posts.set(topic, pending);
  if (pending.timer) return;
  const wait = Math.max(0, pending.last + gap - now);
  pending.timer = setTimeout(() => {
    pending.timer = undefined;
    pending.last = performance.now();
    void notify(topic);
    setTimeout(() => {
      if (!pending.timer && performance.now() - pending.last >= gap) posts.delete(topic);
    }, gap).unref();
  }, wait);
}

/** Tells every process that a state changed; inside the transaction, so that it goes out with the commit. */
export async function postChangeIn(db: Kysely<DB>, sittingId: string): Promise<void> {
  await sql`select pg_notify(${channel}, ${sittingTopic(sittingId)})`.execute(db);
}
