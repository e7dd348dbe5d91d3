import type { Kysely } from 'kysely';
import type { DB } from '@/db/types';
import { loadLibrary } from '@/lib/bank/library';
import type { Library } from '@/lib/templates/library';
import { parseTemplate } from '@/lib/templates/parse';
import type { Template } from '@/lib/templates/plan';

/** Reads template versions as papers were drawn from them, each once. Marks come from the stored draw, so a changed table of machines changes none. */
export class PaperTemplates {
  readonly #read = new Map<string, Template>();
  #library: Library | undefined;

  constructor(readonly db: Kysely<DB>) {}

  /** Throws where a version that once was approved no longer reads: that is a fault of the installation. */
  async of(versionIds: readonly string[]): Promise<ReadonlyMap<string, Template>> {
    const missing = [...new Set(versionIds)].filter((id) => !this.#read.has(id));
    if (missing.length > 0) {
      this.#library ??= loadLibrary();
      for (const row of await this.db.selectFrom('template_version').where('id', 'in', missing).select(['id', 'title', 'text']).execute()) {
        const parsed = parseTemplate(row.text, this.#library);
        if (!parsed.ok) throw new Error(`“${row.title}” does not read any more: ${parsed.problems[0]?.says ?? 'no reason is known.'}`);
        this.#read.set(row.id, parsed.template);
      }
    }
    return this.#read;
  }
}
