import { sql } from 'kysely';
import { insertAccommodation } from '@/lib/accommodations/commands';
import { record } from '@/lib/audit/commands';
import { raiseEpoch, voidLinks } from '@/lib/auth/commands';
import { sendLink } from '@/lib/auth/links';
import { type Context, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { insertAccount, voidSlips } from '@/lib/people/commands';
import { mayManagePeople } from '@/lib/people/policy';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { today } from '@/lib/school/today';
import type { RosterTaken } from './model';
import { planRoster, type Step } from './plan';
import { readSurroundings, type StoredRoster } from './queries';
import { readRoster } from './read';
import { crossProblems, readRow } from './rules';

export type RosterFile = { fileName: string; bytes: Uint8Array; termId: string; makeClasses: boolean; invite: boolean };

/**
 * Reads a roster and keeps it for the preview (`readPreview`); nothing else changes. Refuses what cannot be read as a roster at all;
 * rows that are wrong are problems of the preview. Previews of the actor left lying for two days are dropped.
 */
export async function previewRoster(context: Context, file: RosterFile): Promise<Result<{ id: string }>> {
  const { actor } = context;
  if (!mayManagePeople(actor) || actor.kind !== 'account' || !isId(file.termId)) return notFound();
  const raw = readRoster(file.bytes);
  if (!raw.ok) return raw;
  const day = await today(context.db);
  const read = raw.value.rows.map((row) => readRow(row, day));
  const rows = read.map((one) => one.row);
  const problems = [...read.flatMap((one) => one.problems), ...crossProblems(rows)];
  const { encoding, unknown } = raw.value;
  const stored: StoredRoster = { encoding, unknown, rows, termId: file.termId, makeClasses: file.makeClasses, invite: file.invite };
  return inTransaction(context, async ({ db }) => {
    const term = await db.selectFrom('term').where('id', '=', file.termId).where('state', '=', 'open').select('id').executeTakeFirst();
    if (!term) return refuse('invalid', 'Choose a term that is open.', 'termId');
    await db.updateTable('roster_import').set(emptied('dropped')).where('state', '=', 'previewed').where('made_at', '<', sql<Date>`app.now() - interval '2 days'`).execute();
    const made = await db
      .insertInto('roster_import')
      .values({ made_by: actor.id, file_name: file.fileName.slice(0, 200), rows: JSON.stringify(stored), problems: JSON.stringify(problems) })
      .returning('id')
      .executeTakeFirstOrThrow();
    return done(made);
  });
}

/** What stays of a roster once it was taken or dropped: that there was one. The people's particulars go. */
const emptied = (state: 'taken' | 'dropped') => ({ state, rows: JSON.stringify({}), problems: JSON.stringify([]) });

/** The preview under its row lock, while it is one and the actor's own. */
async function lockPreview(context: LockingContext, id: string): Promise<{ stored: StoredRoster; problems: number } | null> {
  const { actor } = context;
  if (!mayManagePeople(actor) || actor.kind !== 'account' || !isId(id)) return null;
  const row = await context.db
    .selectFrom('roster_import')
    .where('id', '=', id)
    .where('made_by', '=', actor.id)
    .where('state', '=', 'previewed')
    .select(['rows', 'problems'])
    .forUpdate()
    .executeTakeFirst();
  return row ? { stored: row.rows as unknown as StoredRoster, problems: (row.problems as unknown[]).length } : null;
}

/** Drops a preview with everything it held. */
export async function dropRoster(context: Context, id: string): Promise<Result<null>> {
  return inTransaction(context, async (locked) => {
    if (!(await lockPreview(locked, id))) return notFound();
    await locked.db.updateTable('roster_import').set(emptied('dropped')).where('id', '=', id).execute();
    return done(null);
  });
}

/**
 * Takes a previewed roster in: all of it or nothing. Planned anew under the lock of the accounts, so that what changed since the
 * preview cannot be overwritten unseen. Refused: `not-found` (also when taken already), `problems`.
 */
export async function takeRoster(context: Context, id: string): Promise<Result<RosterTaken>> {
  return inTransaction(context, async (locked) => {
    const { actor } = locked;
    const preview = await lockPreview(locked, id);
    if (!preview || actor.kind !== 'account') return notFound();
    await sql`select pg_advisory_xact_lock(hashtext('fullfield accounts')), pg_advisory_xact_lock(hashtext('fullfield terms'))`.execute(locked.db);
    const { stored } = preview;
    const around = await readSurroundings(locked.db, stored.rows, stored.termId, stored.makeClasses);
    if (!around) return notFound();
    const plan = planRoster(stored.rows, around);
    const wrong = preview.problems + plan.problems.length;
    if (wrong > 0) return refuse('problems', `${wrong} ${wrong === 1 ? 'thing is' : 'things are'} to be put right in the file first; nothing was taken in.`);
    const work = new Work(locked, actor.id, stored.invite, await today(locked.db));
    for (const room of around.classes) work.classes.set(room.name.toLowerCase(), room.id);
    for (const name of plan.newClasses) await work.makeClass(stored.termId, name);
    for (const step of plan.steps) await work.take(step);
    await locked.db.updateTable('roster_import').set(emptied('taken')).where('id', '=', id).execute();
    await record(locked, { kind: 'roster.taken', subject: 'roster', subjectId: id, data: { ...work.counts } });
    return done(work.counts);
  });
}

/** One import while it runs: what was made so far, so that a person in two rows becomes one account. */
class Work {
  readonly classes = new Map<string, string>();
  readonly counts: RosterTaken = { people: 0, added: 0, changed: 0, enrolled: 0, invited: 0 };
  private readonly accounts = new Map<string, string>();

  constructor(
    private readonly context: LockingContext,
    private readonly actorId: string,
    private readonly invite: boolean,
    private readonly day: string,
  ) {}

  async makeClass(termId: string, name: string): Promise<void> {
    const { id } = await this.context.db.insertInto('class').values({ term_id: termId, name }).returning('id').executeTakeFirstOrThrow();
    this.classes.set(name.toLowerCase(), id);
    await record(this.context, { kind: 'class.made', subject: 'class', subjectId: id });
  }

  async take(step: Step): Promise<void> {
    const key = (step.row.learnerNumber || step.row.email).toLowerCase();
    const before = this.accounts.get(key);
    const id = before ?? (step.known ? await this.change(step, step.known.id) : await this.add(step));
    if (!before) this.counts.people++;
    this.accounts.set(key, id);
    if (step.enrols || step.teaches) await this.join(step, id);
    if (step.accommodates && step.row.accommodation) await insertAccommodation(this.context, id, this.actorId, step.row.accommodation);
  }

  private async add({ row }: Step): Promise<string> {
    const made = await insertAccount(this.context, row);
    if (!made.ok) throw new Error(`A planned row was refused: ${made.code}`);
    this.counts.added++;
    if (this.invite && row.email) {
      const sent = await sendLink(this.context, made.value.id, 'invitation');
      if (sent.ok && sent.value.sent) this.counts.invited++;
    }
    return made.value.id;
  }

  private async change({ update, addRoles, known }: Step, id: string): Promise<string> {
    const { name, sortName: sort_name, email, learnerNumber: learner_number } = update;
    const fields = Object.keys(update);
    if (fields.length > 0) {
      await this.context.db.updateTable('account').set({ name, sort_name, email, learner_number, changed_at: sql`app.now()` }).where('id', '=', id).execute();
      if (email !== undefined) await voidLinks(this.context, id);
      await record(this.context, { kind: 'account.changed', subject: 'account', subjectId: id, data: { changed: fields }, note: name && known ? `${known.name} → ${name}` : undefined });
    }
    if (addRoles.length > 0) {
      await this.context.db.insertInto('account_role').values(addRoles.map((role) => ({ account_id: id, role }))).execute();
      await raiseEpoch(this.context, id);
      await voidSlips(this.context, id);
      await record(this.context, { kind: 'account.roles-changed', subject: 'account', subjectId: id, data: { added: addRoles } });
    }
    if (fields.length > 0 || addRoles.length > 0) this.counts.changed++;
    return id;
  }

  private async join(step: Step, id: string): Promise<void> {
    const class_id = this.classes.get(step.row.class.toLowerCase());
    if (class_id === undefined) throw new Error(`No class was made for ${step.row.class}.`);
    if (step.teaches) {
      await this.context.db.insertInto('class_instructor').values({ class_id, account_id: id }).onConflict((conflict) => conflict.doNothing()).execute();
      return;
    }
    await this.context.db
      .insertInto('enrolment')
      .values({ class_id, account_id: id, since: this.day })
      .onConflict((conflict) => conflict.columns(['class_id', 'account_id']).doUpdateSet({ since: this.day, until: null }))
      .execute();
    await record(this.context, { kind: 'enrolment.began', subject: 'account', subjectId: id, data: { class: class_id } });
    this.counts.enrolled++;
  }
}
