import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import type { Context } from '@/lib/context';
import { done, notFound, type Result } from '@/lib/result';
import type { CheckState, TemplateState } from './model';
import { mayDecide, mayUseBank } from './policy';
import type { ApprovedVersion, CheckShown, LedgerRow, TemplatePage, VersionShown } from './views';

const asNumber = (value: string | number | null): number | null => (value === null ? null : Number(value));

type RawRow = Omit<LedgerRow, 'check' | 'marks' | 'minutes'> & {
  marks: string | null; minutes: string | null;
  check_state: CheckState | null; check_done: number; check_draws: number; check_problems: number; check_current: boolean;
};

const toLedgerRow = ({ check_state, check_done, check_draws, check_problems, check_current, marks, minutes, ...row }: RawRow): LedgerRow => ({
  ...row,
  marks: asNumber(marks),
  minutes: asNumber(minutes),
  check: check_state && { state: check_state, done: check_done, draws: check_draws, problems: check_problems, current: check_current },
});

/** Every template of the bank, last changed first. */
export async function ledgerRows(context: Context): Promise<Result<LedgerRow[]>> {
  if (!mayUseBank(context.actor)) return notFound();
  const { rows } = await sql<RawRow>`
    select t.id, t.slug, t.title, t.area, t.level, t.kinds, t.marks, t.minutes, t.cautions, t.state, t.changed_at as "changedAt", a.name as "changedBy",
      v.version, coalesce(f.forms, 0) as forms,
      c.state as check_state, c.done as check_done, c.draws as check_draws, c.text = t.text as check_current,
      coalesce(jsonb_array_length(c.report -> 'problems'), 0) as check_problems
    from template t
    left join account a on a.id = t.changed_by
    left join lateral (select max(number) as version from template_version where template_id = t.id) v on true
    left join lateral (
      select count(distinct i.form_id)::integer as forms from form_item i join template_version x on x.id = i.template_version_id where x.template_id = t.id
    ) f on true
    left join lateral (select * from template_check where template_id = t.id and state <> 'cancelled' order by asked_at desc limit 1) c on true
    order by t.changed_at desc, t.slug`.execute(context.db);
  return done(rows.map(toLedgerRow));
}

const checkColumns = sql`c.id, c.state, c.done, c.draws, c.says, c.text = t.text as current, c.asked_at as "askedAt", c.report`;

/** One check by its id. */
export async function readCheck(context: Context, id: string): Promise<Result<CheckShown>> {
  if (!mayUseBank(context.actor)) return notFound();
  const { rows } = await sql<CheckShown>`
    select ${checkColumns} from template_check c join template t on t.id = c.template_id where c.id = ${id}`.execute(context.db);
  return rows[0] ? done(rows[0]) : notFound();
}

async function lastCheck(db: Kysely<DB>, templateId: string): Promise<CheckShown | null> {
  const { rows } = await sql<CheckShown>`
    select ${checkColumns} from template_check c join template t on t.id = c.template_id
    where t.id = ${templateId} order by c.asked_at desc limit 1`.execute(db);
  return rows[0] ?? null;
}

type RawVersion = Omit<VersionShown, 'marks' | 'mayDecide'> & { marks: string; asked_by: string; writers: string[] };

async function versionsOf(context: Context, templateId: string): Promise<VersionShown[]> {
  const { rows } = await sql<RawVersion>`
    select v.id, v.number, author.name as author, v.made_at as "madeAt", v.marks, v.engine, v.writers, r.asked_by, asker.name as "askedBy",
      r.ask_note as "askNote", r.verdict, decider.name as "decidedBy", r.decided_at as "decidedAt", r.note, r.retired_at as "retiredAt",
      (select count(distinct form_id)::integer from form_item where template_version_id = v.id) as forms
    from template_version v
    join account author on author.id = v.author_id
    join template_review r on r.version_id = v.id
    join account asker on asker.id = r.asked_by
    left join account decider on decider.id = r.decided_by
    where v.template_id = ${templateId}
    order by v.number desc`.execute(context.db);
  return rows.map(({ asked_by, writers, marks, ...row }) => ({
    ...row, marks: Number(marks), mayDecide: row.verdict === null && mayDecide(context.actor, { askedBy: asked_by, writers }),
  }));
}

/** A template by its slug, with its versions and its last check. */
export async function templatePage(context: Context, slug: string): Promise<Result<TemplatePage>> {
  if (!mayUseBank(context.actor)) return notFound();
  const row = await context.db
    .selectFrom('template')
    .leftJoin('account', 'account.id', 'template.changed_by')
    .where('slug', '=', slug)
    .select(['template.id', 'slug', 'title', 'area', 'level', 'text', 'revision', 'template.changed_at as changedAt', 'account.name as changedBy'])
    .select((builder) => builder.ref('template.state').$castTo<TemplateState>().as('state'))
    .executeTakeFirst();
  if (!row) return notFound();
  const versions = await versionsOf(context, row.id);
  const inReview = versions.find((version) => version.verdict === null);
  return done({
    ...row,
    versions,
    check: await lastCheck(context.db, row.id),
    inUse: versions.find((version) => version.verdict === 'approved' && version.retiredAt === null)?.number ?? null,
    mayTakeBack: inReview !== undefined && !inReview.mayDecide,
  });
}

/** The working text as it stands now: for whoever meets somebody else's save. */
export async function workingText(context: Context, id: string): Promise<Result<{ text: string; revision: number; changedBy: string | null; changedAt: Date }>> {
  if (!mayUseBank(context.actor)) return notFound();
  const row = await context.db
    .selectFrom('template')
    .leftJoin('account', 'account.id', 'template.changed_by')
    .where('template.id', '=', id)
    .select(['text', 'revision', 'account.name as changedBy', 'template.changed_at as changedAt'])
    .executeTakeFirst();
  return row ? done(row) : notFound();
}

/** The text of one version. */
export async function versionText(context: Context, versionId: string): Promise<Result<{ text: string; number: number; slug: string; title: string }>> {
  if (!mayUseBank(context.actor)) return notFound();
  const row = await context.db
    .selectFrom('template_version')
    .innerJoin('template', 'template.id', 'template_version.template_id')
    .where('template_version.id', '=', versionId)
    .select(['template_version.text', 'template_version.number', 'template.slug', 'template_version.title'])
    .executeTakeFirst();
  return row ? done(row) : notFound();
}

/** The versions that exams may choose, one a template, by area and title; with `ids` only those templates. */
export async function approvedVersions(context: Context, templateIds?: readonly string[]): Promise<Result<ApprovedVersion[]>> {
  if (!mayUseBank(context.actor)) return notFound();
  const only = templateIds ? sql`and t.id = any(${[...templateIds]}::uuid[])` : sql``;
  const { rows } = await sql<Omit<ApprovedVersion, 'minutes' | 'marks'> & { minutes: string; marks: string }>`
    select distinct on (v.template_id) v.id as "versionId", t.id as "templateId", t.slug, v.number, v.title, v.area, v.level, v.minutes, v.marks, v.kinds
    from template_version v
    join template t on t.id = v.template_id
    join template_review r on r.version_id = v.id
    where r.verdict = 'approved' and r.retired_at is null and t.state <> 'retired' ${only}
    order by v.template_id, v.number desc`.execute(context.db);
  const versions = rows.map((row) => ({ ...row, minutes: Number(row.minutes), marks: Number(row.marks) }));
  return done(versions.sort((a, b) => a.area.localeCompare(b.area) || a.title.localeCompare(b.title)));
}
