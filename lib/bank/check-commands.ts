import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { accountId, type Context, inTransaction } from '@/lib/context';
import { addJob } from '@/lib/jobs/add';
import { done, notFound, refuse, type Result } from '@/lib/result';
import type { CheckInput } from './model';
import { mayUseBank } from './policy';
import { readText } from './reading';
import { lockTemplate } from './store';

/**
 * Starts a check of the stored text over `draws` draws as a job. A check of the same text that is under way is answered
 * instead of a second one; one of an older text is cancelled.
 */
export async function startCheck(context: Context, input: CheckInput): Promise<Result<{ checkId: string }>> {
  if (!mayUseBank(context.actor)) return notFound();
  const stored = await context.db.selectFrom('template').select('text').where('id', '=', input.id).executeTakeFirst();
  if (!stored) return notFound();
  const reading = await readText(stored.text);
  if (!reading.ok) return reading;
  const { digest } = reading.value;
  return inTransaction(context, async (locked): Promise<Result<{ checkId: string }>> => {
    const row = await lockTemplate(locked, input.id);
    if (!row) return notFound();
    if (row.text !== stored.text) return refuse('changed-since', 'The text was saved again meanwhile: start the check once more.');
    const running = locked.db.selectFrom('template_check').where('template_id', '=', row.id).where('state', 'in', ['queued', 'running']);
    const same = await running.where('text_digest', '=', digest).where('draws', '=', input.draws).select('id').executeTakeFirst();
    if (same) return done({ checkId: same.id });
    await locked.db
      .updateTable('template_check')
      .set({ state: 'cancelled', ended_at: sql`app.now()`, says: 'A newer check took its place.' })
      .where('template_id', '=', row.id)
      .where('state', 'in', ['queued', 'running'])
      .execute();
    const { id } = await locked.db
      .insertInto('template_check')
      .values({ template_id: row.id, text: row.text, text_digest: digest, draws: input.draws, asked_by: accountId(locked.actor) })
      .returning('id')
      .executeTakeFirstOrThrow();
    await addJob(locked.db, 'check-template', { checkId: id }, { key: `check-template:${id}`, heavy: true });
    await record(locked, { kind: 'template.check-started', subject: 'template', subjectId: row.id, data: { check: id, draws: input.draws } });
    return done({ checkId: id });
  });
}

/** Cancels a check that waits or runs; the job sees it at its next sign of progress and ends. */
export async function cancelCheck(context: Context, input: { id: string }): Promise<Result<null>> {
  if (!mayUseBank(context.actor)) return notFound();
  return inTransaction(context, async (locked): Promise<Result<null>> => {
    const check = await locked.db.selectFrom('template_check').select(['template_id', 'state']).where('id', '=', input.id).forUpdate().executeTakeFirst();
    if (!check) return notFound();
    if (check.state !== 'queued' && check.state !== 'running') return refuse('ended', 'This check has ended already.');
    await locked.db.updateTable('template_check').set({ state: 'cancelled', ended_at: sql`app.now()` }).where('id', '=', input.id).execute();
    await record(locked, { kind: 'template.check-cancelled', subject: 'template', subjectId: check.template_id, data: { check: input.id } });
    return done(null);
  });
}
