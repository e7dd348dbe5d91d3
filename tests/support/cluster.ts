import { sql } from 'kysely';
import { openDatabase } from '@/db/client';
import { startTemporaryCluster, type TemporaryCluster } from '@/db/temporary';
import { prepareDatabase } from '@/lib/cli/prepare';

export const templateName = 'fullfield_template';

/** A PostgreSQL for this process alone, with the migrated template database that test files clone. */
export async function startTestCluster(label = 'tests'): Promise<TemporaryCluster> {
  const temporary = await startTemporaryCluster(label, { database: templateName });
  await prepareTemplate(temporary.cluster.url);
  return temporary;
}

/** Migrates the database and marks it as a test's, which lets its clock be shifted. */
export async function prepareTemplate(url: string): Promise<void> {
  await prepareDatabase(url);
  const owner = openDatabase(url, undefined, { max: 1 });
  await sql`update app.installation set kind = 'test'`.execute(owner);
  await owner.destroy();
}
