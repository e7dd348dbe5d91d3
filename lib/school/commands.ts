import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { type Context, holds, inTransaction } from '@/lib/context';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { type SchoolInput, schoolSettings } from './model';

/** Stores the school's settings; refused when somebody else stored them since they were read. */
export async function saveSchool(context: Context, input: SchoolInput): Promise<Result<{ version: number }>> {
  if (context.actor.kind !== 'system' && !holds(context.actor, 'registrar')) return notFound();
  const { name, version, ...settings } = input;
  return inTransaction(context, async (locked) => {
    const before = await locked.db.selectFrom('school').select(['version', 'settings']).forUpdate().executeTakeFirstOrThrow();
    if (before.version !== version) return refuse('changed-since', 'Somebody else changed the settings meanwhile. Load the page again and repeat your change.');
    const after = schoolSettings.parse(settings);
    await locked.db.updateTable('school').set({ name, settings: JSON.stringify(after), version: version + 1, changed_at: sql`app.now()` }).execute();
    const old = schoolSettings.parse(before.settings);
    const changed = (Object.keys(after) as (keyof typeof after)[]).filter((key) => after[key] !== old[key]);
    await record(locked, { kind: 'school.changed', subject: 'school', subjectId: 'school', data: { changed } });
    return done({ version: version + 1 });
  });
}
