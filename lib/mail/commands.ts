import { createHash, randomUUID } from 'node:crypto';
import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import { config } from '@/lib/config';
import { addJob } from '@/lib/jobs/add';
import { done, type Result, refuse } from '@/lib/result';
import { type OutgoingMail, outgoingMail } from './model';
import { nextMailState } from './rules';

/** `<hash@host>`: the same for one thing and one recipient for ever, so that a message sent twice is recognised as one. */
function messageId(once: string | undefined, kind: string, to: string): string {
  const host = new URL(config().publicUrl).hostname;
  const domain = /[a-z]/i.test(host) && host.includes('.') ? host : 'fullfield.invalid';
  const local = once === undefined ? randomUUID() : createHash('sha256').update(JSON.stringify([kind, once, to.toLowerCase()])).digest('hex').slice(0, 40);
  return `<${local}@${domain}>`;
}

/**
 * Puts a message into the queue through `db` (a transaction: it is sent only when that commits).
 * The caller has checked that its actor may send it. Refuses `invalid` (an address or a subject that a header cannot hold)
 * and `sent-before` (the same thing is queued or sent to this address already; `sendAgain` is the deliberate way).
 */
export async function queueMail(db: Kysely<DB>, message: OutgoingMail): Promise<Result<{ mailId: string }, 'invalid' | 'sent-before'>> {
  const read = outgoingMail.safeParse(message);
  if (!read.success) {
    const issue = read.error.issues[0];
    return refuse('invalid', `The message cannot be sent: ${issue?.path.join('.')} ${issue?.message}.`, issue?.path.join('.'));
  }
  const mail = read.data;
  const inserted = await db
    .insertInto('mail')
    .values({
      kind: mail.kind,
      account_id: mail.accountId,
      report_id: mail.reportId,
      sitting_id: mail.sittingId,
      to_address: mail.to,
      subject: mail.subject,
      body: mail.body,
      attach: JSON.stringify(mail.attach),
      message_id: messageId(mail.once, mail.kind, mail.to),
      made_by: mail.madeBy,
    })
    .onConflict((conflict) => conflict.column('message_id').doNothing())
    .returning('id')
    .executeTakeFirst();
  if (!inserted) return refuse('sent-before', `This was queued or sent to ${mail.to} before. Look at its state; it can be sent again from there.`);
  await addJob(db, 'send-mail', { mailId: inserted.id }, { key: `mail ${inserted.id}`, maxAttempts: 3 });
  return done({ mailId: inserted.id });
}

/** Sends a failed or unsure message again, with the same Message-ID, because a person asked for it. The caller has checked the actor. */
export async function sendAgain(db: Kysely<DB>, mailId: string): Promise<Result<null, 'not-found' | 'not-in-this-state'>> {
  return db.transaction().execute(async (trx) => {
    const mail = await trx.selectFrom('mail').select(['state', 'attempts']).where('id', '=', mailId).forUpdate().executeTakeFirst();
    if (!mail) return refuse('not-found', 'There is no such message.');
    const step = nextMailState(mail.state as Parameters<typeof nextMailState>[0], { event: 'ask again' }, mail.attempts);
    if (!step.ok) return refuse('not-in-this-state', `A message that is ${mail.state} is not sent again.`);
    await trx
      .updateTable('mail')
      .set({ state: step.state, attempts: 0, says: '', next_at: sql`app.now()`, changed_at: sql`app.now()` })
      .where('id', '=', mailId)
      .execute();
    await addJob(trx, 'send-mail', { mailId }, { key: `mail ${mailId}`, maxAttempts: 3 });
    return done(null);
  });
}
