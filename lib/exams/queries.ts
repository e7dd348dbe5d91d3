import { sql } from 'kysely';
import { type Context, accountId } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, type Result } from '@/lib/result';
import { type ExamContent, examContent, type ExamState, type VersionFacts } from './model';
import { mayUseExams } from './policy';

/** Stored content as the model has it; what an older release left out takes its default. */
export const readContent = (stored: unknown): ExamContent => examContent.parse(stored);

function versionRows(context: Context) {
  return context.db
    .selectFrom('template_version as v')
    .innerJoin('template as t', 't.id', 'v.template_id')
    .leftJoin('template_review as r', 'r.version_id', 'v.id')
    .leftJoin(
      (from) =>
        from
          .selectFrom('template_version as nv')
          .innerJoin('template_review as nr', 'nr.version_id', 'nv.id')
          .where('nr.verdict', '=', 'approved')
          .where('nr.retired_at', 'is', null)
          .distinctOn('nv.template_id')
          .select(['nv.template_id', 'nv.id as newest_id', 'nv.number as newest_number'])
          .orderBy('nv.template_id')
          .orderBy('nv.number', 'desc')
          .as('newest'),
      (join) => join.onRef('newest.template_id', '=', 'v.template_id'),
    )
    .select([
      'v.template_id', 'v.id as version_id', 't.slug', 'v.title', 'v.area', 'v.level', 'v.number', 'v.marks', 'v.minutes', 'v.kinds',
      'newest.newest_id', 'newest.newest_number',
      sql<boolean>`coalesce(r.verdict = 'approved' and r.retired_at is null, false)`.as('usable'),
    ]);
}
type VersionRow = Awaited<ReturnType<ReturnType<typeof versionRows>['execute']>>[number];

const factsOf = (row: VersionRow): VersionFacts => ({
  templateId: row.template_id,
  versionId: row.version_id,
  slug: row.slug,
  title: row.title,
  area: row.area,
  level: row.level,
  number: row.number,
  marks: Number(row.marks),
  minutes: Number(row.minutes),
  parts: row.kinds.length,
  kinds: row.kinds,
  usable: row.usable,
  newer: row.newest_id !== null && row.newest_number !== null && row.newest_number > row.number ? { versionId: row.newest_id, number: row.newest_number } : null,
});

/** Versions by id, in whatever state; unknown ids are left out. For commands and queries that authorised already. */
export async function versionsById(context: Context, ids: readonly string[]): Promise<Map<string, VersionFacts>> {
  if (ids.length === 0) return new Map();
  const rows = await versionRows(context).where('v.id', 'in', [...new Set(ids)]).execute();
  return new Map(rows.map((row) => [row.version_id, factsOf(row)]));
}

export const versionIdsOf = (content: ExamContent): string[] => content.sections.flatMap((section) => section.items.map((item) => item.versionId));

/** What may be chosen for an exam: the newest approved version of every template that is not retired. */
export async function choosableVersions(context: Context): Promise<Result<VersionFacts[]>> {
  if (!mayUseExams(context.actor)) return notFound();
  const rows = await versionRows(context)
    .whereRef('newest.newest_id', '=', 'v.id')
    .where('t.state', '<>', 'retired')
    .orderBy('v.area')
    .orderBy('v.level')
    .orderBy('v.title')
    .execute();
  return done(rows.map(factsOf));
}

export type ExamRow = {
  id: string;
  title: string;
  state: ExamState;
  questions: number;
  marks: number;
  /** Time allowed [min]. */
  minutes: number;
  /** Expected working time [min]. */
  expected: number;
  forms: number;
  sittings: number;
  owner: string;
  changedAt: Date;
};

/** The ledger of exams, latest change first. */
export async function examLedger(context: Context): Promise<Result<ExamRow[]>> {
  if (!mayUseExams(context.actor)) return notFound();
  const rows = await context.db
    .selectFrom('exam as e')
    .innerJoin('account as a', 'a.id', 'e.owner_id')
    .select((of) => [
      'e.id', 'e.title', 'e.state', 'e.content', 'e.changed_at', 'a.name as owner',
      of.selectFrom('form as f').whereRef('f.exam_id', '=', 'e.id').select(sql<number>`count(*)::int`.as('n')).as('forms'),
      of.selectFrom('sitting as s').innerJoin('form as f', 'f.id', 's.form_id').whereRef('f.exam_id', '=', 'e.id').select(sql<number>`count(*)::int`.as('n')).as('sittings'),
    ])
    .orderBy('e.changed_at', 'desc')
    .execute();
  const contents = rows.map((row) => readContent(row.content));
  const versions = await versionsById(context, contents.flatMap(versionIdsOf));
  return done(
    rows.map((row, index) => {
      const content = contents[index] as ExamContent;
      const chosen = versionIdsOf(content).flatMap((id) => versions.get(id) ?? []);
      return {
        id: row.id, title: row.title, state: row.state as ExamState, owner: row.owner, changedAt: row.changed_at,
        questions: chosen.length,
        marks: chosen.reduce((sum, version) => sum + version.marks, 0),
        expected: chosen.reduce((sum, version) => sum + version.minutes, 0),
        minutes: content.minutes,
        forms: row.forms ?? 0,
        sittings: row.sittings ?? 0,
      };
    }),
  );
}

export type FormRow = { id: string; number: number; title: string; marks: number; minutes: number; approvedAt: Date; approvedBy: string; digest: string; sittings: number };

export type ExamPage = {
  id: string;
  title: string;
  state: ExamState;
  revision: number;
  content: ExamContent;
  owner: string;
  changedAt: Date;
  changedBy: string;
  reviewNote: string;
  reviewAskedBy: string | null;
  /** May the reader approve it now (a second instructor)? */
  mayDecide: boolean;
  versions: VersionFacts[];
  forms: FormRow[];
};

async function formsOf(context: Context, examId: string): Promise<FormRow[]> {
  const rows = await context.db
    .selectFrom('form as f')
    .innerJoin('account as a', 'a.id', 'f.approved_by')
    .where('f.exam_id', '=', examId)
    .select((of) => [
      'f.id', 'f.number', 'f.title', 'f.marks', 'f.minutes', 'f.approved_at', 'a.name', 'f.digest',
      of.selectFrom('sitting as s').whereRef('s.form_id', '=', 'f.id').select(sql<number>`count(*)::int`.as('n')).as('sittings'),
    ])
    .orderBy('f.number', 'desc')
    .execute();
  return rows.map((row) => ({
    id: row.id, number: row.number, title: row.title, marks: Number(row.marks), minutes: row.minutes,
    approvedAt: row.approved_at, approvedBy: row.name, digest: row.digest, sittings: row.sittings ?? 0,
  }));
}

/** One exam as its sheet shows it. */
export async function examPage(context: Context, examId: string): Promise<Result<ExamPage>> {
  if (!mayUseExams(context.actor) || !isId(examId)) return notFound();
  const row = await context.db
    .selectFrom('exam as e')
    .innerJoin('account as owner', 'owner.id', 'e.owner_id')
    .innerJoin('account as changer', 'changer.id', 'e.changed_by')
    .leftJoin('account as asker', 'asker.id', 'e.review_asked_by')
    .where('e.id', '=', examId)
    .selectAll('e')
    .select(['owner.name as owner_name', 'changer.name as changer_name', 'asker.name as asker_name'])
    .executeTakeFirst();
  if (!row) return notFound();
  const content = readContent(row.content);
  const versions = await versionsById(context, versionIdsOf(content));
  const me = accountId(context.actor);
  return done({
    id: row.id, title: row.title, state: row.state as ExamState, revision: row.revision, content,
    owner: row.owner_name, changedAt: row.changed_at, changedBy: row.changer_name,
    reviewNote: row.review_note, reviewAskedBy: row.asker_name,
    mayDecide: row.state === 'in review' && me !== null && row.review_asked_by !== me && !row.writers.includes(me),
    versions: [...versions.values()],
    forms: await formsOf(context, row.id),
  });
}

export type SchedulableForm = { id: string; title: string; number: number; marks: number; minutes: number; questions: number };

/** Forms that a sitting may be scheduled with: those of exams that are not retired, newest first. */
export async function schedulableForms(context: Context): Promise<Result<SchedulableForm[]>> {
  if (!mayUseExams(context.actor)) return notFound();
  const rows = await context.db
    .selectFrom('form as f')
    .innerJoin('exam as e', 'e.id', 'f.exam_id')
    .where('e.state', '<>', 'retired')
    .select((of) => [
      'f.id', 'f.title', 'f.number', 'f.marks', 'f.minutes',
      of.selectFrom('form_item as i').whereRef('i.form_id', '=', 'f.id').select(sql<number>`count(*)::int`.as('n')).as('questions'),
    ])
    .orderBy('f.title')
    .orderBy('f.number', 'desc')
    .execute();
  return done(rows.map((row) => ({ ...row, marks: Number(row.marks), questions: row.questions ?? 0 })));
}
