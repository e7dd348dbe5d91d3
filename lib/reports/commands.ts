import { readClock } from '@/db/clock';
import { publicLink } from '@/lib/config';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { queueMail, sendAgain } from '@/lib/mail/commands';
import { gradeReportPdf } from '@/lib/pdf/grade-report';
import { record } from '@/lib/audit/commands';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { keepsRecords } from '@/lib/results/relation';
import { logReport, newestResult } from '@/lib/results/store';
import { readSchool } from '@/lib/school/queries';
import { buildReport } from './build';
import { reportDigest } from './model';

const candidatesIn = (context: LockingContext, sittingId: string, ids: readonly string[]) =>
  context.db
    .selectFrom('candidate as c').innerJoin('sitting', 'sitting.id', 'c.sitting_id')
    .where('sitting.id', '=', sittingId).where('c.id', 'in', [...ids]).where(keepsRecords(context.actor))
    .select('c.id').orderBy('c.id').forUpdate('c').execute();

const newestReport = (context: LockingContext, candidateId: string) =>
  context.db.selectFrom('report').select(['id', 'issue', 'at', 'result_issue']).where('candidate_id', '=', candidateId).orderBy('issue', 'desc').limit(1).executeTakeFirst();

/** Issues one candidate's report; false where the result is not sealed, or its report is there already and `again` is not asked for. */
async function issueOne(context: LockingContext, candidateId: string, by: { id: string; name: string }, again: boolean): Promise<boolean> {
  const result = await newestResult(context.db, candidateId);
  if (!result || (result.state !== 'sealed' && result.state !== 'amended')) return false;
  const before = await newestReport(context, candidateId);
  if (before?.result_issue === result.issue && !again) return false;
  const content = await buildReport(context.db, { result, before, school: await readSchool(context.db), by: by.name, now: await readClock(context.db) });
  const digest = reportDigest(content);
  const row = await context.db
    .insertInto('report')
    .values({
      candidate_id: candidateId, result_issue: result.issue, issue: content.issue, code: content.code, content: JSON.stringify(content), digest,
      pdf: await gradeReportPdf(content, digest), made_by: by.id,
    })
    .returningAll().executeTakeFirstOrThrow();
  await logReport(context, row);
  return true;
}

/**
 * Issues grade reports of sealed results, one transaction a report. Those that have theirs already are left, unless `again`
 * asks for a further issue, which supersedes the one before.
 */
export async function issueReports(context: Context, input: { sittingId: string; candidateIds: readonly string[]; again?: boolean }): Promise<Result<{ issued: number }>> {
  const { actor } = context;
  const me = accountId(actor);
  if (!me || !isId(input.sittingId) || input.candidateIds.length === 0 || !input.candidateIds.every(isId)) return notFound();
  let issued = 0;
  let found = 0;
  for (const id of input.candidateIds) {
    issued += await inTransaction(context, async (locked) => {
      const [candidate] = await candidatesIn(locked, input.sittingId, [id]);
      if (!candidate) return 0;
      found += 1;
      return Number(await issueOne(locked, candidate.id, { id: me, name: actor.name }, input.again === true));
    });
  }
  if (found === 0) return notFound();
  return issued > 0 ? done({ issued }) : refuse('nothing-to-issue', 'Nothing was issued: these results are not sealed yet, or their reports are there already.');
}

export type Sent = { queued: number; before: number; withoutAddress: number; withoutReport: number };

/** No marks: they stand behind sign-in or in the PDF. */
const bodyOf = (name: string, exam: string, school: string, link: string | null): string =>
  [
    `Hello ${name},`, '',
    link ? `your grade report for “${exam}” can be read and downloaded here, after signing in:\n${link}` : `your grade report for “${exam}” is attached.`, '',
    `${school}`, '',
  ].join('\n');

async function sendOne(context: LockingContext, candidateId: string, by: string): Promise<keyof Sent> {
  const report = await newestReport(context, candidateId);
  if (!report) return 'withoutReport';
  const who = await context.db
    .selectFrom('candidate as c').innerJoin('account as a', 'a.id', 'c.account_id').innerJoin('sitting as s', 's.id', 'c.sitting_id').innerJoin('form as f', 'f.id', 's.form_id')
    .where('c.id', '=', candidateId).select(['a.id', 'a.name', 'a.email', 's.id as sitting_id', 'f.title']).executeTakeFirstOrThrow();
  if (!who.email) return 'withoutAddress';
  const { name: school, settings } = await readSchool(context.db);
  const link = settings.attachReports ? null : publicLink(`/results/${candidateId}`);
  const mail = await queueMail(context.db, {
    kind: 'grade report', to: who.email, subject: `Your grade report: ${who.title}`, body: bodyOf(who.name, who.title, school, link),
    attach: settings.attachReports ? [{ name: `grade-report-issue-${report.issue}.pdf`, type: 'application/pdf', report: report.id }] : [],
    accountId: who.id, reportId: report.id, sittingId: who.sitting_id, madeBy: by, once: `report ${report.id} issue ${report.issue}`,
  });
  if (!mail.ok) return mail.code === 'sent-before' ? 'before' : 'withoutAddress';
  await record(context, { kind: 'report.sent', subject: 'candidate', subjectId: candidateId, data: { report: report.id, mail: mail.value.mailId } });
  return 'queued';
}

/** Queues the newest report of each candidate for the own e-mail address, once for ever: attached or as a link, as the school has it. */
export async function sendReports(context: Context, input: { sittingId: string; candidateIds: readonly string[] }): Promise<Result<Sent>> {
  const me = accountId(context.actor);
  if (!me || !isId(input.sittingId) || input.candidateIds.length === 0 || !input.candidateIds.every(isId)) return notFound();
  return inTransaction(context, async (locked) => {
    const candidates = await candidatesIn(locked, input.sittingId, input.candidateIds);
    if (candidates.length === 0) return notFound();
    const sent: Sent = { queued: 0, before: 0, withoutAddress: 0, withoutReport: 0 };
    for (const { id } of candidates) sent[await sendOne(locked, id, me)] += 1;
    return done(sent);
  });
}

/** Sends a report's message again that failed, or of which nobody knows whether it arrived; with the same Message-ID. */
export async function sendReportAgain(context: Context, mailId: string): Promise<Result<null>> {
  if (!isId(mailId)) return notFound();
  const mail = await context.db
    .selectFrom('mail').innerJoin('sitting', 'sitting.id', 'mail.sitting_id')
    .where('mail.id', '=', mailId).where('mail.kind', '=', 'grade report').where(keepsRecords(context.actor)).select('mail.id').executeTakeFirst();
  return mail ? sendAgain(context.db, mail.id) : notFound();
}
