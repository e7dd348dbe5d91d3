import type { Database } from '@/db/client';
import { sendRequestedLink } from './links';

/** Job `send-reset-link`: makes and mails the link that somebody asked for on the sign-in page. */
export async function sendResetLink(db: Database, payload: { accountId: string | null }): Promise<void> {
  await sendRequestedLink({ db, actor: { kind: 'system', name: 'reset request' } }, payload.accountId);
}
