import type { LockingContext } from '@/lib/context';
import { areaTitles } from '@/lib/bank/areas';
import { readContent } from '@/lib/exams/queries';
import { canonical } from '@/lib/audit/model';
import type { Totals } from './model';
import type { ResultFacts } from './rules';
import { newestMarks, type ResultRow, storeResult, totalsIn } from './store';
import { totalsOf } from './totals';

/** What a candidate's marks, as they count now, come to under the form's pass rule. Who never started is absent. */
export async function computeTotals(context: LockingContext, candidateId: string, sat: boolean): Promise<Totals> {
  const form = await context.db
    .selectFrom('candidate as c').innerJoin('sitting as s', 's.id', 'c.sitting_id').innerJoin('form as f', 'f.id', 's.form_id')
    .where('c.id', '=', candidateId).select(['f.id', 'f.content']).executeTakeFirstOrThrow();
  const items = await context.db
    .selectFrom('form_item as i').innerJoin('template_version as v', 'v.id', 'i.template_version_id')
    .where('i.form_id', '=', form.id).select(['i.question', 'i.section', 'v.area', 'v.marks']).orderBy('i.question').execute();
  const marks = sat ? await newestMarks(context.db, [candidateId]).execute() : [];
  const content = readContent(form.content);
  const titles = areaTitles();
  return totalsOf({
    sections: content.sections.map(({ title, leastPercent }) => ({ title, leastPercent })),
    rule: content.passRule,
    questions: items.map(({ question, section, area, marks: of }) => ({
      section, area, areaTitle: titles[area] ?? area, of: Number(of),
      awarded: marks.filter((mark) => mark.question === question).reduce((sum, mark) => sum + mark.awarded, 0),
    })),
    sat,
    forMarker: marks.some((mark) => mark.verdict === 'for-marker'),
  });
}

/** Stores the candidate's result as it comes out now, unless it already says so. */
export async function renewResult(
  context: LockingContext, candidateId: string, before: ResultRow | undefined, next: ResultFacts, how: { sat: boolean; why: string },
): Promise<boolean> {
  const totals = await computeTotals(context, candidateId, how.sat);
  const same = before && before.state === next.state && before.withheld === next.withheld && canonical(totals) === canonical(totalsIn(before));
  if (same) return false;
  await storeResult(context, candidateId, before, { ...totals, ...next }, how.why);
  return true;
}
