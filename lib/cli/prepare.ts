import { openDatabase } from '@/db/client';
import { migrateToLatest } from '@/db/migrate';
import { installQueue } from '@/lib/jobs/install';

/**
 * Brings the database at `ownerUrl` to the newest schema, the queue's tables included.
 * Returns the names of the migrations applied now.
 */
export async function prepareDatabase(ownerUrl: string): Promise<string[]> {
  const owner = openDatabase(ownerUrl, undefined, { max: 2, name: 'fullfield migrate' });
  try {
    const applied = await migrateToLatest(owner);
    await installQueue(owner, ownerUrl);
    return applied;
  } finally {
    await owner.destroy();
  }
}
