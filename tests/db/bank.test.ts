import { sql } from 'kysely';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { cancelCheck, startCheck } from '@/lib/bank/check-commands';
import { bringInFiles, newTemplate, saveDraft } from '@/lib/bank/commands';
import { checkTemplateJob } from '@/lib/bank/jobs';
import { approvedVersions, ledgerRows, readCheck, templatePage, versionText, workingText } from '@/lib/bank/queries';
import { readText } from '@/lib/bank/reading';
import { askForReview, decideReview, retire, takeBack } from '@/lib/bank/review-commands';
import { closeSandbox } from '@/lib/bank/sandbox';
import type { Context } from '@/lib/context';
import type { Result } from '@/lib/result';
import { openTestDatabase, type TestDatabase } from '../support/database';
import { makeAccount } from '../support/room';

const textOf = (slug: string, key = 'V / R') => `template: ${slug}
language: 1
title: Current in a resistance
area: dc-motors
level: 1
minutes: 3
cautions: [live-test]
given:
  V: { label: Supply voltage, unit: V, choose: [120, 208, 240] }
  R: { label: Load resistance, unit: ohm, range: [8, 60], step: 0.1 }
stem: |
  A resistance of {{R}} is connected to a {{V}} supply.
parts:
  - part: a
    kind: number
    ask: Find the current.
    key: ${key}
    unit: A
    marks: 1
solution: |
  $I = V / R = {{part.a}}$
`;

let database: TestDatabase;
let ivo: Context & { id: string };
let mara: Context & { id: string };
let others: Context[];
let made = 0;
let id: string;
let slug: string;

function valueOf<Value>(result: Result<Value>): Value {
  if (!result.ok) throw new Error(`${result.code}: ${result.says}`);
  return result.value;
}
const pageOf = async (context: Context, of = slug) => valueOf(await templatePage(context, of));
const jobsOf = async (checkId: string) => {
  const { rows } = await sql<{ count: number }>`select count(*) from graphile_worker.jobs where key = ${`check-template:${checkId}`}`.execute(database.owner);
  return rows[0]?.count;
};

/** A check of the stored text, run as the worker would. */
async function check(): Promise<string> {
  const { checkId } = valueOf(await startCheck(ivo, { id, draws: 2_000 }));
  await checkTemplateJob(database.app, { checkId });
  return checkId;
}
const ask = async (context: Context = ivo) => askForReview(context, { id, revision: (await pageOf(ivo)).revision, note: '' });
async function approve(): Promise<string> {
  await check();
  const { versionId } = valueOf(await ask());
  valueOf(await decideReview(mara, { versionId, verdict: 'approved', note: '' }));
  return versionId;
}

beforeAll(async () => {
  database = await openTestDatabase();
  const person = (name: string, ...roles: ('instructor' | 'registrar' | 'proctor' | 'student')[]) => makeAccount(database.owner, database.app, name, ...roles);
  ivo = await person('Ivo Lind', 'instructor');
  mara = await person('Mara Quist', 'instructor', 'proctor');
  // The reading process takes a while to start; then it stays warm.
  await readText('');
  others = [await person('Rut Adler', 'registrar', 'proctor'), await person('Sol Berg', 'student'), { db: database.app, actor: { kind: 'system', name: 'job' } }];
});
afterAll(async () => {
  closeSandbox();
  await database.close();
});
beforeEach(async () => {
  slug = `ohm-${(made += 1)}`;
  expect(valueOf(await bringInFiles(ivo, [{ name: `${slug}.yaml`, text: textOf(slug) }]))[0]).toMatchObject({ outcome: 'new', slug });
  ({ id } = await pageOf(ivo));
});

describe('a working text', () => {
  it('is kept as typed, also when it does not read', async () => {
    const text = `${textOf(slug)}  : not yaml {\n`;
    const saved = valueOf(await saveDraft(ivo, { id, text, revision: 1 }));
    expect(saved).toMatchObject({ revision: 2, state: 'draft' });
    expect(await pageOf(mara)).toMatchObject({ text, title: 'Current in a resistance', changedBy: 'Ivo Lind' });
  });

  it('is not overwritten by whoever saves second', async () => {
    const texts = [textOf(slug, 'R / V'), textOf(slug, 'V * R')];
    const outcomes = await Promise.all([saveDraft(ivo, { id, text: texts[0] ?? '', revision: 1 }), saveDraft(mara, { id, text: texts[1] ?? '', revision: 1 })]);
    const won = outcomes.findIndex((outcome) => outcome.ok);
    expect(outcomes.filter((outcome) => outcome.ok)).toHaveLength(1);
    expect(outcomes[1 - won]).toMatchObject({ ok: false, code: 'changed-since' });
    expect(valueOf(await workingText(ivo, id))).toMatchObject({ text: texts[won], revision: 2 });
  });

  it('may change its slug until a version bears it', async () => {
    expect(valueOf(await saveDraft(ivo, { id, text: textOf(`${slug}-b`), revision: 1 })).slug).toBe(`${slug}-b`);
    slug = `${slug}-b`;
    await check();
    valueOf(await ask());
    valueOf(await takeBack(ivo, { id }));
    expect(valueOf(await saveDraft(ivo, { id, text: textOf(`${slug}-c`), revision: 2 })).slug).toBe(slug);
    await check();
    expect(await ask()).toMatchObject({ ok: false, code: 'slug' });
  });

  it('comes from files: known again, changed, refused', async () => {
    const files = [{ name: 'a.yaml', text: textOf(slug) }, { name: 'b.yaml', text: textOf(slug, 'V * 1 / R') }, { name: '….yaml', text: 'nothing' }, { name: 'notes.txt', text: textOf('notes') }];
    expect(valueOf(await bringInFiles(ivo, files)).map(({ outcome }) => outcome)).toEqual(['same', 'changed', 'refused', 'refused']);
    await expect(newTemplate(mara, { title: 'Twin', slug, area: 'dc-motors', level: 1, caution: '' })).resolves.toMatchObject({ ok: false, code: 'slug-taken' });
    const fresh = valueOf(await newTemplate(mara, { title: 'Current: "first"', slug: `new-${made}`, area: 'dc-motors', level: 2, caution: 'live-test' }));
    expect(await pageOf(ivo, fresh.slug)).toMatchObject({ title: 'Current: "first"', area: 'dc-motors', level: 2, state: 'draft' });
  });
});

describe('a review', () => {
  it('needs a check in order of exactly this text over 2,000 draws', async () => {
    expect(await ask()).toMatchObject({ ok: false, code: 'not-checked' });
    const short = valueOf(await startCheck(ivo, { id, draws: 500 }));
    await checkTemplateJob(database.app, short);
    expect(await ask()).toMatchObject({ ok: false, code: 'not-checked' });
    await check();
    valueOf(await saveDraft(ivo, { id, text: textOf(slug, 'V * 1 / R'), revision: 1 }));
    expect(await ask()).toMatchObject({ ok: false, code: 'not-checked' });
    await check();
    expect(valueOf(await ask())).toMatchObject({ state: 'in review', number: 1 });
    expect(await saveDraft(ivo, { id, text: textOf(slug), revision: 2 })).toMatchObject({ ok: false, code: 'in-review' });
  });

  it('is decided neither by who wrote on the text nor by who asked', async () => {
    valueOf(await saveDraft(mara, { id, text: textOf(slug, 'V * 1 / R'), revision: 1 }));
    await check();
    const { versionId } = valueOf(await ask(ivo));
    const decide = (context: Context) => decideReview(context, { versionId, verdict: 'approved', note: '' });
    expect(await decide(ivo)).toMatchObject({ ok: false, code: 'own-work' });
    expect(await decide(mara)).toMatchObject({ ok: false, code: 'own-work' });
    const third = await makeAccount(database.owner, database.app, 'Ada Noor', 'instructor');
    expect(valueOf(await decide(third))).toMatchObject({ state: 'approved' });
    expect(await decide(third)).toMatchObject({ ok: false, code: 'decided' });
    await expect(sql`update template_review set decided_by = asked_by where version_id = ${versionId}`.execute(database.owner)).rejects.toThrow(/check constraint/);
  });

  it('returns a text with a note, and two deciding at once decide once', async () => {
    await check();
    const { versionId } = valueOf(await ask());
    const third = await makeAccount(database.owner, database.app, 'Jo Abel', 'instructor');
    const both = await Promise.all([
      decideReview(mara, { versionId, verdict: 'returned', note: 'Say which resistance.' }), decideReview(third, { versionId, verdict: 'approved', note: '' }),
    ]);
    expect(both.filter(({ ok }) => ok)).toHaveLength(1);
    const page = await pageOf(ivo);
    expect(page.state).toBe(both[0].ok ? 'draft' : 'approved');
    expect(page.versions[0]).toMatchObject({ verdict: both[0].ok ? 'returned' : 'approved' });
  });

  it('leaves the approved version in use while the text goes on, until the template is retired', async () => {
    const versionId = await approve();
    const used = async () => valueOf(await approvedVersions(ivo, [id]));
    expect(await used()).toMatchObject([{ versionId, slug, number: 1, marks: 1, minutes: 3, kinds: ['number'] }]);
    const { state } = valueOf(await saveDraft(ivo, { id, text: textOf(slug, 'V * 1 / R'), revision: 1 }));
    expect(state).toBe('draft');
    expect(await used()).toMatchObject([{ versionId }]);
    valueOf(await retire(mara, { id }));
    expect(await used()).toEqual([]);
    expect(await saveDraft(ivo, { id, text: textOf(slug), revision: 2 })).toMatchObject({ ok: false, code: 'retired' });
  });

  it('makes versions that nobody can change, with the digests of what they rest on', async () => {
    const versionId = await approve();
    const row = await database.app.selectFrom('template_version').selectAll().where('id', '=', versionId).executeTakeFirstOrThrow();
    expect(Object.keys(row.digests as object).sort()).toEqual(['area:dc-motors', 'caution:live-test', 'engine', 'text']);
    await expect(database.app.updateTable('template_version').set({ text: 'x' }).where('id', '=', versionId).execute()).rejects.toThrow(/permission denied/);
    await expect(database.owner.updateTable('template_version').set({ text: 'x' }).where('id', '=', versionId).execute()).rejects.toThrow(/append-only/);
    await expect(database.owner.deleteFrom('template_version').where('id', '=', versionId).execute()).rejects.toThrow(/append-only|foreign key/);
    expect(valueOf(await versionText(mara, versionId)).text).toBe(textOf(slug));
  });
});

describe('a check', () => {
  it('tells how far it is and what it found', async () => {
    const { checkId } = valueOf(await startCheck(ivo, { id, draws: 10_000 }));
    expect(valueOf(await startCheck(mara, { id, draws: 10_000 }))).toEqual({ checkId });
    expect(await jobsOf(checkId)).toBe(1);
    const seen = new Set<number>();
    const running = checkTemplateJob(database.app, { checkId });
    let over = false;
    void running.finally(() => (over = true));
    while (!over) seen.add(valueOf(await readCheck(ivo, checkId)).done);
    await running;
    expect([...seen].some((count) => count > 0 && count < 10_000)).toBe(true);
    expect(valueOf(await readCheck(ivo, checkId))).toMatchObject({ state: 'in order', done: 10_000, current: true, report: { ok: true, draws: 10_000, problems: [] } });
    expect(valueOf(await ledgerRows(ivo)).find((row) => row.id === id)?.check).toMatchObject({ state: 'in order', current: true });
  });

  it('names problems with their seeds, and of a text that does not read the place', async () => {
    valueOf(await saveDraft(ivo, { id, text: textOf(slug, '"V / (R > 30 ? 0 : R)"'), revision: 1 }));
    const found = valueOf(await readCheck(ivo, await check()));
    expect(found.state).toBe('problems');
    expect(found.report).toMatchObject({ problems: expect.arrayContaining([expect.objectContaining({ code: 'not-finite', seeds: expect.arrayContaining([expect.stringMatching(/^check-\d+$/)]) })]) });
    valueOf(await saveDraft(ivo, { id, text: textOf(slug, 'V / Q'), revision: 2 }));
    expect(valueOf(await readCheck(ivo, await check()))).toMatchObject({ state: 'problems', report: { problems: [{ code: 'name', line: 17 }] } });
  });

  it('ends soon after it was cancelled, and a job that comes late does nothing', async () => {
    const { checkId } = valueOf(await startCheck(ivo, { id, draws: 10_000 }));
    const running = checkTemplateJob(database.app, { checkId });
    await expect.poll(async () => valueOf(await readCheck(ivo, checkId)).state, { interval: 20 }).toBe('running');
    valueOf(await cancelCheck(mara, { id: checkId }));
    await running;
    await checkTemplateJob(database.app, { checkId });
    const after = valueOf(await readCheck(ivo, checkId));
    expect(after).toMatchObject({ state: 'cancelled', report: null });
    expect(after.done).toBeLessThan(10_000);
  });

  it('is taken up again where a worker was killed', async () => {
    const { checkId } = valueOf(await startCheck(ivo, { id, draws: 2_000 }));
    const killed = new AbortController();
    const running = checkTemplateJob(database.app, { checkId }, killed.signal);
    await expect.poll(async () => valueOf(await readCheck(ivo, checkId)).state, { interval: 5 }).toBe('running');
    killed.abort();
    await expect(running).rejects.toThrow(/taken up again/);
    expect(valueOf(await readCheck(ivo, checkId)).state).toBe('running');
    await checkTemplateJob(database.app, { checkId });
    expect(valueOf(await readCheck(ivo, checkId))).toMatchObject({ state: 'in order', done: 2_000 });
  });
});

describe('the bank', () => {
  it('is not there for anybody but instructors', async () => {
    const versionId = await approve();
    const { checkId } = valueOf(await startCheck(ivo, { id, draws: 2_000 }));
    for (const context of others) {
      const tries: Promise<Result<unknown>>[] = [
        ledgerRows(context), templatePage(context, slug), workingText(context, id), versionText(context, versionId), approvedVersions(context), readCheck(context, checkId),
        newTemplate(context, { title: 'T', slug: 't', area: 'dc-motors', level: 1, caution: '' }), saveDraft(context, { id, text: 'x', revision: 1 }), bringInFiles(context, [{ name: 'x.yaml', text: textOf(slug) }]),
        startCheck(context, { id, draws: 500 }), cancelCheck(context, { id: checkId }), askForReview(context, { id, revision: 1, note: '' }),
        decideReview(context, { versionId, verdict: 'approved', note: '' }), takeBack(context, { id }), retire(context, { id }),
      ];
      for (const outcome of await Promise.all(tries)) expect(outcome).toMatchObject({ ok: false, code: 'not-found' });
    }
    expect((await pageOf(ivo)).state).toBe('approved');
  });
});
