import { sql } from 'kysely';
import type { Database } from '@/db/client';
import { type Context, inTransaction, type LockingContext } from '@/lib/context';
import { publicLink } from '@/lib/config';
import { addJob } from '@/lib/jobs/add';
import { queueMail } from '@/lib/mail/commands';
import { done, type Result } from '@/lib/result';
import type { School } from '@/lib/school/model';
import { readSchool } from '@/lib/school/queries';
import { showAppointment } from '@/lib/school/times';
import { voidLinks } from './commands';
import { beginTry, triesAt } from './delays';
import type { LinkPurpose } from './model';
import { newToken, tokenDigest } from './tokens';

export type MadeLink = { token: string; address: string; expiresAt: Date };

const pathOf = (purpose: LinkPurpose, token: string): `/${string}` => (purpose === 'invitation' ? `/invitation/${token}` : `/reset/${token}`);

/**
 * Makes a link for an account; earlier ones expire at once. The token exists only in what is returned, the database keeps its digest.
 * The caller has checked the actor. How long it lasts is the school's setting.
 */
export async function makeLink(context: LockingContext, accountId: string, purpose: LinkPurpose): Promise<MadeLink> {
  const { settings } = await readSchool(context.db);
  const hours = purpose === 'invitation' ? settings.invitationDays * 24 : settings.resetHours;
  await voidLinks(context, accountId);
  const token = newToken();
  const { expires_at } = await context.db
    .insertInto('account_link')
    .values({ account_id: accountId, purpose, token_hash: tokenDigest(token), expires_at: sql`app.now() + make_interval(hours => ${hours})` })
    .returning('expires_at')
    .executeTakeFirstOrThrow();
  return { token, address: publicLink(pathOf(purpose, token)), expiresAt: expires_at };
}

function letter(purpose: LinkPurpose, name: string, link: MadeLink, school: School): { subject: string; body: string } {
  const until = showAppointment(link.expiresAt, school.settings);
  const help = school.settings.helpAddress ? `Questions: ${school.settings.helpAddress}\n` : '';
  const close = `The link works once, until ${until}.\nNobody at ${school.name} will ask you for your password.\n\n${help}`;
  if (purpose === 'invitation')
    return {
      subject: `Your account at ${school.name}`,
      body: `${name},\n\n${school.name} has made an account for you, for its exams and results.\nChoose a password here:\n\n${link.address}\n\n${close}`,
    };
  return {
    subject: `A new password at ${school.name}`,
    body: `${name},\n\nsomebody, probably you, asked for a new password at ${school.name}.\nChoose it here:\n\n${link.address}\n\nIf it was not you, do nothing: your password stays as it is.\n${close}`,
  };
}

/** Makes a link and queues the mail that carries it; `sent: false` where the account has no address. The caller has checked the actor. */
export async function sendLink(context: LockingContext, accountId: string, purpose: LinkPurpose): Promise<Result<{ sent: boolean }>> {
  const account = await context.db.selectFrom('account').where('id', '=', accountId).select(['name', 'email']).executeTakeFirstOrThrow();
  if (account.email === null) return done({ sent: false });
  const school = await readSchool(context.db);
  const link = await makeLink(context, accountId, purpose);
  const madeBy = context.actor.kind === 'account' ? context.actor.id : null;
  const queued = await queueMail(context.db, { kind: purpose, to: account.email, accountId, madeBy, ...letter(purpose, account.name, link, school) });
  return queued.ok ? done({ sent: true }) : queued;
}

/**
 * Asks for a reset link. The answer is the same for everybody, and so is the work: who it is for is found here, the link is made and
 * mailed by a job. Asked too often, nothing more is sent, and that is not told either.
 */
export async function requestReset(db: Database, identifier: string, address: string): Promise<void> {
  const typed = identifier.trim().toLowerCase();
  const account = await db
    .selectFrom('account')
    .where((where) => where.or([where('email', '=', typed), where(sql`lower(learner_number)`, '=', typed)]))
    .where('state', '<>', 'closed')
    .select('id')
    .executeTakeFirst();
  if ((await beginTry(db, triesAt('reset', account?.id ?? typed, address))) > 0) return;
  await addJob(db, 'send-reset-link', { accountId: account?.id ?? null });
}

/** The job behind `requestReset`: an invited account gets its invitation again, an active one a reset link. */
export async function sendRequestedLink(context: Context, accountId: string | null): Promise<void> {
  if (accountId === null) return;
  await inTransaction(context, async (locked) => {
    const account = await locked.db.selectFrom('account').where('id', '=', accountId).select('state').forUpdate().executeTakeFirst();
    if (!account || account.state === 'closed') return;
    await sendLink(locked, accountId, account.state === 'invited' ? 'invitation' : 'reset');
  });
}
