import { sql } from 'kysely';
import type { Database } from '@/db/client';
import { forgivenAfterMinutes, type Slowing, slowing, waitAfter } from './rules';
import { delayKey } from './tokens';

type Watch = { key: string; slowing: Slowing };
export type Tries = { watches: readonly Watch[] };

/** What is watched for a try at `subject` (an account's id, or what was typed when there is none) from `address`. */
export function triesAt(kind: 'sign-in' | 'slip' | 'reset', subject: string, address: string): Tries {
  return {
    watches: [
      { key: delayKey(`${kind} pair`, subject, address), slowing: slowing.pair },
      { key: delayKey(`${kind} account`, subject), slowing: slowing.account },
      { key: delayKey(`${kind} address`, address), slowing: slowing.address },
    ],
  };
}

/**
 * Counts a try as failed before it is looked at, so that tries at the same time cannot slip by; `forgive` takes it back.
 * Returns 0 when it may go on, else the seconds to wait (then nothing was counted).
 */
export async function beginTry(db: Database, tries: Tries): Promise<number> {
  const keys = tries.watches.map((watch) => watch.key).sort();
  return db.transaction().execute(async (trx) => {
    await trx
      .insertInto('sign_in_delay')
      .values(keys.map((key) => ({ key, failures: 0, last_at: sql<Date>`app.now()`, free_at: sql<Date>`app.now()` })))
      .onConflict((conflict) => conflict.column('key').doNothing())
      .execute();
    const rows = await trx
      .selectFrom('sign_in_delay')
      .where('key', 'in', keys)
      .select(['key', 'failures'])
      .select(sql<number>`extract(epoch from free_at - app.now())::float8`.as('wait'))
      .select(sql<boolean>`last_at < app.now() - make_interval(mins => ${forgivenAfterMinutes})`.as('forgiven'))
      .orderBy('key')
      .forUpdate()
      .execute();
    const wait = Math.max(0, ...rows.map((row) => row.wait));
    if (wait > 0) return wait;
    for (const row of rows) {
      const watch = tries.watches.find((one) => one.key === row.key);
      if (!watch) throw new Error(`No watch has the key ${row.key}.`);
      const failures = (row.forgiven ? 0 : row.failures) + 1;
      await trx
        .updateTable('sign_in_delay')
        .set({ failures, last_at: sql`app.now()`, free_at: sql`app.now() + make_interval(secs => ${waitAfter(failures, watch.slowing)})` })
        .where('key', '=', row.key)
        .execute();
    }
    return 0;
  });
}

/** After a right try: the account's counts begin again, the address's loses the one that was counted. Old rows go. */
export async function forgive(db: Database, tries: Tries): Promise<void> {
  const own = tries.watches.filter((watch) => watch.slowing !== slowing.address).map((watch) => watch.key);
  const shared = tries.watches.filter((watch) => watch.slowing === slowing.address).map((watch) => watch.key);
  // One row a statement: no two locks are held at once, so none can be waited for in a circle.
  for (const key of own) await db.deleteFrom('sign_in_delay').where('key', '=', key).execute();
  await sql`delete from sign_in_delay where key in
    (select key from sign_in_delay where last_at < app.now() - interval '1 day' order by key limit 100 for update skip locked)`.execute(db);
  await db
    .updateTable('sign_in_delay')
    .set({ failures: sql`greatest(failures - 1, 0)`, free_at: sql`app.now()` })
    .where('key', 'in', shared)
    .execute();
}
