import { sql } from 'kysely';
import type { LockingContext } from '@/lib/context';
import type { TemplateState } from './model';

/** A template as the commands need it, its row locked until the transaction ends. */
export type LockedTemplate = {
  id: string;
  slug: string;
  state: TemplateState;
  text: string;
  revision: number;
  writers: string[];
  changed_by: string | null;
  /** Number of the newest version; 0 when there is none. */
  versions: number;
  inUse: boolean;
};

const found = (context: LockingContext) =>
  context.db
    .selectFrom('template')
    .select(['id', 'slug', 'text', 'revision', 'writers', 'changed_by'])
    .select((row) => row.ref('state').$castTo<TemplateState>().as('state'))
    .forUpdate();

async function withVersions(context: LockingContext, row: Omit<LockedTemplate, 'versions' | 'inUse'> | undefined): Promise<LockedTemplate | null> {
  if (!row) return null;
  const { versions, inUse } = await context.db
    .selectFrom('template_version')
    .leftJoin('template_review', 'template_review.version_id', 'template_version.id')
    .where('template_version.template_id', '=', row.id)
    .select([
      sql<number>`coalesce(max(template_version.number), 0)`.as('versions'),
      sql<boolean>`coalesce(bool_or(template_review.verdict = 'approved' and template_review.retired_at is null), false)`.as('inUse'),
    ])
    .executeTakeFirstOrThrow();
  return { ...row, versions, inUse };
}

export const lockTemplate = async (context: LockingContext, id: string): Promise<LockedTemplate | null> =>
  withVersions(context, await found(context).where('id', '=', id).executeTakeFirst());
export const lockTemplateBySlug = async (context: LockingContext, slug: string): Promise<LockedTemplate | null> =>
  withVersions(context, await found(context).where('slug', '=', slug).executeTakeFirst());

/** `writers` with this account, once. */
export const withWriter = (writers: readonly string[], account: string): string[] => [...new Set([...writers, account])];
