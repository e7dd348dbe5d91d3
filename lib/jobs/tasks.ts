import type { Database } from '@/db/client';
import { sendResetLink } from '@/lib/auth/jobs';
import { checkTemplateJob } from '@/lib/bank/jobs';
import { config } from '@/lib/config';
import { sendMail } from '@/lib/mail/send';
import { drawPapers } from '@/lib/planning/jobs';
import { markPaperJob, markSittingJob } from '@/lib/results/jobs';
import type { JobName, JobPayloads } from './model';

export type JobTools = {
  /** The application's role. */
  db: Database;
  /** Raised when the worker must stop at once: long work looks at it between steps and throws. */
  signal: AbortSignal;
};

type Handler<Name extends JobName> = (payload: JobPayloads[Name], tools: JobTools) => Promise<void>;

/**
 * What each job does. A handler may run twice (a worker killed half-way is noticed and its job given to another), so it looks
 * first what is done already. Throwing means "try again later".
 */
export const handlers: { readonly [Name in JobName]: Handler<Name> } = {
  'draw-papers': async (payload, { db, signal }) => {
    await drawPapers(db, payload, signal);
  },
  'check-template': (payload, { db, signal }) => checkTemplateJob(db, payload, signal),
  'send-reset-link': (payload, { db }) => sendResetLink(db, payload),
  'mark-paper': (payload, { db }) => markPaperJob(db, payload),
  'mark-sitting': (payload, { db, signal }) => markSittingJob(db, payload, signal),
  'send-mail': ({ mailId }, { db }) => sendMail(db, config().smtpUrl, mailId),
};
