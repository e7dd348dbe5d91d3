import type { Kysely } from 'kysely';
import type { DB } from '@/db/types';
import { type School, schoolSettings } from './model';

/** The school of this installation; settings that were never set have their defaults. Readable by everyone. */
export async function readSchool(db: Kysely<DB>): Promise<School> {
  const row = await db.selectFrom('school').select(['name', 'settings', 'version']).executeTakeFirstOrThrow();
  return { name: row.name || 'Fullfield', version: row.version, settings: schoolSettings.parse(row.settings) };
}
