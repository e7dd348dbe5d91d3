import { type Context, holds } from '@/lib/context';
import { readContent } from '@/lib/exams/queries';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { type FactsOf, sittingFacts } from './facts';
import type { Outcome, ResultState, SectionShare } from './model';
import { mayReadRecords } from './policy';
import { keepsRecords, readsRecords, resultSittings } from './relation';
import { type Condition, sealConditions } from './rules';
import { newestResults } from './store';

export type RecordRow = { id: string; title: string; className: string; exam: string; startsAt: Date; facts: FactsOf; reports: number };

/** Sittings that have results: all for a registrar, those of own classes for an instructor; latest first. */
export async function recordsLedger(context: Context): Promise<Result<RecordRow[]>> {
  if (!mayReadRecords(context.actor)) return notFound();
  const rows = await context.db
    .selectFrom('sitting').innerJoin('class', 'class.id', 'sitting.class_id').innerJoin('form', 'form.id', 'sitting.form_id')
    .where('sitting.state', 'in', resultSittings).where(readsRecords(context.actor))
    .select((of) => [
      'sitting.id', 'sitting.title', 'class.name as class_name', 'form.title as exam', 'sitting.starts_at',
      of.selectFrom('report as r').innerJoin('candidate as c', 'c.id', 'r.candidate_id').whereRef('c.sitting_id', '=', 'sitting.id')
        .select((inner) => inner.fn.count<number>('r.candidate_id').distinct().as('n')).as('reports'),
    ])
    .orderBy('sitting.starts_at', 'desc').execute();
  const facts = await sittingFacts(context.db, rows.map((row) => row.id));
  return done(rows.flatMap((row) => {
    const known = facts.get(row.id);
    return known ? [{ id: row.id, title: row.title, className: row.class_name, exam: row.exam, startsAt: row.starts_at, facts: known, reports: row.reports ?? 0 }] : [];
  }));
}

export type RecordLine = {
  id: string;
  name: string;
  learnerNumber: string | null;
  hasEmail: boolean;
  result: { total: number; of: number; percent: number; outcome: Outcome; state: ResultState; withheld: boolean; sections: SectionShare[] } | null;
  report: { id: string; issue: number; current: boolean; mail: { id: string; state: string; says: string } | null } | null;
};
export type RecordPage = {
  id: string; title: string; className: string; exam: string; room: string; startsAt: Date; marks: number; passPercent: number;
  sections: { title: string; of: number }[]; lines: RecordLine[]; conditions: Condition[]; facts: FactsOf; keeps: boolean;
};

const sittingRow = (context: Context, sittingId: string) =>
  context.db
    .selectFrom('sitting').innerJoin('class', 'class.id', 'sitting.class_id').innerJoin('form', 'form.id', 'sitting.form_id')
    .where('sitting.id', '=', sittingId).where('sitting.state', 'in', resultSittings).where(readsRecords(context.actor))
    .select(['sitting.id', 'sitting.title', 'sitting.room', 'sitting.starts_at', 'class.name as class_name', 'form.id as form_id', 'form.title as exam', 'form.marks', 'form.content'])
    .executeTakeFirst();

async function sectionsOf(context: Context, formId: string, titles: readonly string[]): Promise<{ title: string; of: number }[]> {
  const rows = await context.db
    .selectFrom('form_item as i').innerJoin('template_version as v', 'v.id', 'i.template_version_id').where('i.form_id', '=', formId)
    .groupBy('i.section').select((of) => ['i.section', of.fn.sum<number>('v.marks').as('marks')]).orderBy('i.section').execute();
  return rows.map((row) => ({ title: titles[row.section - 1] || `Section ${row.section}`, of: Number(row.marks) }));
}

const lineRows = (context: Context, sittingId: string) =>
  context.db
    .selectFrom('candidate as c').innerJoin('account as a', 'a.id', 'c.account_id')
    .leftJoin(newestResults(context.db).as('r'), 'r.candidate_id', 'c.id')
    .leftJoin(
      (from) => from.selectFrom('report').distinctOn('candidate_id').select(['id', 'candidate_id', 'issue', 'result_issue']).orderBy('candidate_id').orderBy('issue', 'desc').as('p'),
      (join) => join.onRef('p.candidate_id', '=', 'c.id'),
    )
    .leftJoin(
      (from) => from.selectFrom('mail').where('kind', '=', 'grade report').distinctOn('report_id').select(['id', 'report_id', 'state', 'says']).orderBy('report_id').orderBy('made_at', 'desc').as('m'),
      (join) => join.onRef('m.report_id', '=', 'p.id'),
    )
    .where('c.sitting_id', '=', sittingId)
    .select([
      'c.id', 'a.name', 'a.learner_number', 'a.email', 'r.total', 'r.of', 'r.percent', 'r.outcome', 'r.state', 'r.withheld', 'r.breakdown', 'r.issue as result_issue',
      'p.id as report_id', 'p.issue as report_issue', 'p.result_issue as reported', 'm.id as mail_id', 'm.state as mail_state', 'm.says as mail_says',
    ])
    .orderBy('a.sort_name').orderBy('c.id').execute();

function lineOf(row: Awaited<ReturnType<typeof lineRows>>[number]): RecordLine {
  const breakdown = row.breakdown as unknown as { sections: SectionShare[] } | null;
  return {
    id: row.id, name: row.name, learnerNumber: row.learner_number, hasEmail: row.email !== null,
    result: row.state === null ? null : {
      total: row.total ?? 0, of: row.of ?? 0, percent: row.percent ?? 0, outcome: row.outcome as Outcome, state: row.state as ResultState, withheld: row.withheld === true,
      sections: breakdown?.sections ?? [],
    },
    report: row.report_id === null || row.report_issue === null ? null : {
      id: row.report_id, issue: row.report_issue, current: row.reported === row.result_issue,
      mail: row.mail_id === null || row.mail_state === null ? null : { id: row.mail_id, state: row.mail_state, says: row.mail_says ?? '' },
    },
  };
}

/** A sitting's results: totals by section, outcome, state, report and its e-mail. No question, answer or key. */
export async function recordPage(context: Context, sittingId: string): Promise<Result<RecordPage>> {
  const row = isId(sittingId) && mayReadRecords(context.actor) ? await sittingRow(context, sittingId) : undefined;
  const facts = row && (await sittingFacts(context.db, [row.id])).get(row.id);
  if (!row || !facts) return notFound();
  const content = readContent(row.content);
  const kept = await context.db.selectFrom('sitting').where('sitting.id', '=', row.id).where(keepsRecords(context.actor)).select('sitting.id').executeTakeFirst();
  return done({
    id: row.id, title: row.title, className: row.class_name, exam: row.exam, room: row.room, startsAt: row.starts_at, marks: Number(row.marks),
    passPercent: content.passRule.overallPercent, sections: await sectionsOf(context, row.form_id, content.sections.map((section) => section.title)),
    lines: (await lineRows(context, row.id)).map(lineOf), conditions: sealConditions(facts), facts, keeps: kept !== undefined && holds(context.actor, 'registrar'),
  });
}
