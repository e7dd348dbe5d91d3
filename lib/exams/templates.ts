import { libraryDigests, loadLibrary } from '@/lib/bank/library';
import type { Context } from '@/lib/context';
import { done, refuse, type Result } from '@/lib/result';
import { parseTemplate } from '@/lib/templates/parse';
import type { Template } from '@/lib/templates/plan';

export type ReadVersion = { versionId: string; templateId: string; title: string; template: Template };

/** What a version rests on and that is no longer as it was when the version was made; null where nothing changed. */
function changedSince(digests: unknown, now: Readonly<Record<string, string>>): string | null {
  const rests = Object.entries(digests as Record<string, string>).filter(([name]) => /^(area|caution|table):/.test(name));
  return rests.find(([name, digest]) => now[name] !== digest)?.[0] ?? null;
}

/**
 * Reads versions as they were approved, in the order asked for. Refused where one rests on a table or caution that changed
 * since, because it would not draw what was approved. For callers that authorised already.
 */
export async function readVersions(context: Pick<Context, 'db'>, ids: readonly string[]): Promise<Result<ReadVersion[]>> {
  if (ids.length === 0) return done([]);
  const rows = await context.db.selectFrom('template_version').where('id', 'in', [...new Set(ids)]).select(['id', 'template_id', 'title', 'text', 'digests']).execute();
  const library = loadLibrary();
  const digests = libraryDigests(library);
  const read = new Map<string, ReadVersion>();
  for (const row of rows) {
    const changed = changedSince(row.digests, digests);
    if (changed) return refuse('library-changed', `“${row.title}” rests on ${changed.replace(':', ' ')}, which changed since it was approved: have a new version approved.`);
    const parsed = parseTemplate(row.text, library);
    if (!parsed.ok) return refuse('unreadable', `“${row.title}” does not read any more: ${parsed.problems[0]?.says ?? 'no reason is known.'}`);
    read.set(row.id, { versionId: row.id, templateId: row.template_id, title: row.title, template: parsed.template });
  }
  const missing = ids.find((id) => !read.has(id));
  if (missing) return refuse('unknown-version', 'A template version of this exam is not in the bank.');
  return done(ids.flatMap((id) => read.get(id) ?? []));
}
