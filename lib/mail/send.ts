import { sql } from 'kysely';
import { z } from 'zod';
import type { Database } from '@/db/client';
import { addJob } from '@/lib/jobs/add';
import { readSchool } from '@/lib/school/queries';
import { type Attachment, attachmentSchema, kindsWithSecret, type MailKind, type MailState } from './model';
import { nextMailState } from './rules';
import { type Outcome, type ReadyMail, sendOnce } from './transport';

const erased = 'The text held a personal link and was erased when the server had taken the message.';

type Begun = { attempts: number; mail: ReadyMail; kind: MailKind };

/** Commits that the message is being sent, before anything is. Null when it is not to be sent now. */
function begin(db: Database, mailId: string): Promise<Begun | null> {
  return db.transaction().execute(async (trx) => {
    const mail = await trx.selectFrom('mail').selectAll().where('id', '=', mailId).forUpdate().executeTakeFirst();
    if (!mail) return null;
    // Only one job a message runs at a time, so a message found in `sending` was left there by a program that stopped.
    if (mail.state === 'sending') {
      await trx
        .updateTable('mail_attempt')
        .set({ outcome: 'unsure', says: 'The program stopped while sending.', ended_at: sql`app.now()` })
        .where('mail_id', '=', mailId)
        .where('ended_at', 'is', null)
        .execute();
      await trx
        .updateTable('mail')
        .set({ state: 'unsure', says: 'The program stopped while sending: it may have arrived or not.', changed_at: sql`app.now()` })
        .where('id', '=', mailId)
        .execute();
      return null;
    }
    const attempts = mail.attempts + 1;
    const step = nextMailState(mail.state as MailState, { event: 'begin' }, attempts);
    if (!step.ok) return null;
    const ready = await compose(trx, mail);
    await trx.updateTable('mail').set({ state: step.state, attempts, changed_at: sql`app.now()` }).where('id', '=', mailId).execute();
    const last = await trx
      .selectFrom('mail_attempt')
      .select((row) => row.fn.max('number').as('number'))
      .where('mail_id', '=', mailId)
      .executeTakeFirst();
    await trx.insertInto('mail_attempt').values({ mail_id: mailId, number: (last?.number ?? 0) + 1 }).execute();
    return { attempts, kind: mail.kind as MailKind, mail: ready };
  });
}

async function contentOf(db: Database, attachment: Attachment): Promise<string | Buffer> {
  if ('text' in attachment) return attachment.text;
  return (await db.selectFrom('report').select('pdf').where('id', '=', attachment.report).executeTakeFirstOrThrow()).pdf;
}

async function compose(db: Database, row: { to_address: string; subject: string; body: string; message_id: string; attach: unknown }): Promise<ReadyMail> {
  const school = await readSchool(db);
  const attach = z.array(attachmentSchema).parse(row.attach);
  return {
    from: { name: school.settings.senderName || school.name, address: school.settings.senderAddress || 'no-reply@fullfield.invalid' },
    to: row.to_address,
    subject: row.subject,
    text: row.body,
    messageId: row.message_id,
    attachments: await Promise.all(
      attach.map(async (one) => ({ filename: one.name, contentType: one.type, content: await contentOf(db, one) })),
    ),
  };
}

async function finish(db: Database, mailId: string, begun: Begun, outcome: Outcome): Promise<void> {
  const step = nextMailState('sending', { event: outcome.event }, begun.attempts);
  if (!step.ok) throw new Error(`A message in sending has no step for ${outcome.event}.`);
  const pause = step.retryAfterSeconds ?? 0;
  const wipe = step.state === 'accepted' && kindsWithSecret.includes(begun.kind);
  await db.transaction().execute(async (trx) => {
    const { next_at } = await trx
      .updateTable('mail')
      .set({
        state: step.state,
        says: outcome.says,
        next_at: sql<Date>`app.now() + make_interval(secs => ${pause})`,
        changed_at: sql`app.now()`,
        ...(wipe ? { body: erased } : {}),
      })
      .where('id', '=', mailId)
      .where('state', '=', 'sending')
      .returning('next_at')
      .executeTakeFirstOrThrow();
    await trx
      .updateTable('mail_attempt')
      .set({ ended_at: sql`app.now()`, outcome: attemptOutcome(outcome), says: outcome.says })
      .where('mail_id', '=', mailId)
      .where('ended_at', 'is', null)
      .execute();
    if (step.state === 'queued') await addJob(trx, 'send-mail', { mailId }, { key: `mail ${mailId}`, runAt: next_at, maxAttempts: 3 });
  });
}

const attemptOutcome = (outcome: Outcome): 'accepted' | 'failed' | 'unsure' =>
  outcome.event === 'taken' ? 'accepted' : outcome.event === 'cut off' ? 'unsure' : 'failed';

/**
 * Sends one queued message: commits `sending`, hands it over once, records the outcome. Run by the job `send-mail` alone.
 * A crash between leaves `sending`, which the next run of the job turns into `unsure`.
 */
export async function sendMail(db: Database, smtpUrl: string | undefined, mailId: string): Promise<void> {
  // Without a server the message waits; setting SMTP_URL and starting again sends what waits.
  if (!smtpUrl) return;
  const begun = await begin(db, mailId);
  if (!begun) return;
  await finish(db, mailId, begun, await sendOnce(smtpUrl, begun.mail));
}

/**
 * Puts a job behind every message that waits or was left in `sending` and has none. Run when a worker starts: after SMTP_URL was
 * given, after a restore, after a crash.
 */
export async function requeueMail(db: Database): Promise<number> {
  const waiting = await db.selectFrom('mail').select(['id', 'next_at', 'state']).where('state', 'in', ['queued', 'sending']).execute();
  for (const { id, next_at, state } of waiting) {
    await addJob(db, 'send-mail', { mailId: id }, { key: `mail ${id}`, runAt: state === 'queued' ? next_at : undefined, maxAttempts: 3 });
  }
  return waiting.length;
}
