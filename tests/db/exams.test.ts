import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import type { Context } from '@/lib/context';
import { approveExam, askForReview, newExam, retireExam, returnExam, saveExam } from '@/lib/exams/commands';
import { previewPaper } from '@/lib/exams/preview';
import { examLedger, examPage, choosableVersions, schedulableForms } from '@/lib/exams/queries';
import { openTestDatabase, type TestDatabase } from '../support/database';
import { contentOf, makeForm, makeVersion, valueOf, type Version } from '../support/exams';
import { makeAccount } from '../support/room';

let database: TestDatabase;
let ivo: Context & { id: string };
let mara: Context & { id: string };
let others: Context[];
let one: Version;
let two: Version;

beforeAll(async () => {
  database = await openTestDatabase();
  ivo = await makeAccount(database.owner, database.app, 'Ivo', 'instructor');
  mara = await makeAccount(database.owner, database.app, 'Mara', 'instructor');
  others = await Promise.all((['student', 'proctor', 'registrar'] as const).map((role) => makeAccount(database.owner, database.app, role, role)));
  one = await makeVersion(database.owner, ivo.id, { decider: mara.id });
  two = await makeVersion(database.owner, ivo.id, { decider: mara.id });
});
afterAll(() => database.close());

async function draft(versions: Version[] = [one, two], change = {}): Promise<{ examId: string; revision: number }> {
  const { examId } = valueOf(await newExam(ivo, { title: 'Machines' }));
  const { revision } = valueOf(await saveExam(ivo, examId, { title: 'Machines', revision: 1, content: contentOf(versions, change) }));
  return { examId, revision };
}

describe('writing an exam', () => {
  it('refuses the second of two changes that began from the same text', async () => {
    const { examId, revision } = await draft();
    expect((await saveExam(mara, examId, { title: 'By Mara', revision, content: contentOf([one]) })).ok).toBe(true);
    expect(await saveExam(ivo, examId, { title: 'By Ivo', revision, content: contentOf([two]) })).toMatchObject({ ok: false, code: 'changed-since' });
    expect(valueOf(await examPage(ivo, examId)).title).toBe('By Mara');
  });

  it('lets one of two saves at the same moment through', async () => {
    const { examId, revision } = await draft();
    const results = await Promise.all([ivo, mara].map((who) => saveExam(who, examId, { title: 'At once', revision, content: contentOf([one]) })));
    expect(results.filter((result) => result.ok)).toHaveLength(1);
  });

  it('offers approved versions only', async () => {
    const waiting = await makeVersion(database.owner, ivo.id, { decider: mara.id, verdict: null });
    const offered = valueOf(await choosableVersions(ivo)).map((version) => version.versionId);
    expect(offered).toContain(one.versionId);
    expect(offered).not.toContain(waiting.versionId);
  });

  it('adds marks and minutes up by what stands on it', async () => {
    const { examId } = await draft();
    const row = valueOf(await examLedger(ivo)).find((exam) => exam.id === examId);
    expect(row).toMatchObject({ questions: 2, marks: 6, expected: 10, minutes: 120 });
  });
});

describe('review', () => {
  it('is not asked for while the exam has nothing to ask, or something that is not approved', async () => {
    const empty = await draft([]);
    expect(await askForReview(ivo, empty.examId, empty.revision)).toMatchObject({ ok: false, code: 'empty-section' });
    const waiting = await makeVersion(database.owner, ivo.id, { decider: mara.id, verdict: null });
    const early = await draft([waiting]);
    expect(await askForReview(ivo, early.examId, early.revision)).toMatchObject({ ok: false, code: 'not-approved' });
    const timeless = await draft([one], { minutes: 0 });
    expect(await askForReview(ivo, timeless.examId, timeless.revision)).toMatchObject({ ok: false, code: 'no-time' });
  });

  it('is never decided by who asked or wrote', async () => {
    const { examId, revision } = await draft();
    valueOf(await askForReview(ivo, examId, revision));
    expect(await approveExam(ivo, examId, { revision, note: '' })).toMatchObject({ ok: false, code: 'second-instructor' });
    const shared = await draft();
    const after = valueOf(await saveExam(mara, shared.examId, { title: 'Machines', revision: shared.revision, content: contentOf([two]) }));
    valueOf(await askForReview(mara, shared.examId, after.revision));
    expect(await approveExam(ivo, shared.examId, { revision: after.revision, note: '' })).toMatchObject({ ok: false, code: 'second-instructor' });
  });

  it('returns it with words, and keeps the text still meanwhile', async () => {
    const { examId, revision } = await draft();
    valueOf(await askForReview(ivo, examId, revision));
    expect(await saveExam(ivo, examId, { title: 'Later', revision, content: contentOf([one]) })).toMatchObject({ ok: false, code: 'state' });
    expect(await returnExam(mara, examId, ' ')).toMatchObject({ ok: false, code: 'note' });
    valueOf(await returnExam(mara, examId, 'Too little on generators.'));
    expect(valueOf(await examPage(ivo, examId))).toMatchObject({ state: 'draft', reviewNote: 'Too little on generators.' });
  });

  it('is refused when a version was retired between asking and approving', async () => {
    const passing = await makeVersion(database.owner, ivo.id, { decider: mara.id });
    const { examId, revision } = await draft([passing]);
    valueOf(await askForReview(ivo, examId, revision));
    await database.owner.updateTable('template_review').set({ retired_at: new Date() }).where('version_id', '=', passing.versionId).execute();
    expect(await approveExam(mara, examId, { revision, note: '' })).toMatchObject({ ok: false, code: 'not-approved' });
  });
});

describe('the form', () => {
  it('is frozen: later changes make the next one, and the database refuses to alter it', async () => {
    const { examId, formId } = await makeForm(ivo, mara, [one, two]);
    const before = await database.owner.selectFrom('form').selectAll().where('id', '=', formId).executeTakeFirstOrThrow();
    expect(before).toMatchObject({ number: 1, minutes: 120, marks: 6 });
    const page = valueOf(await examPage(ivo, examId));
    const { revision } = valueOf(await saveExam(ivo, examId, { title: 'Second form', revision: page.revision, content: contentOf([two]) }));
    valueOf(await askForReview(ivo, examId, revision));
    expect(valueOf(await approveExam(mara, examId, { revision, note: 'in order' })).number).toBe(2);
    expect(await database.owner.selectFrom('form').selectAll().where('id', '=', formId).executeTakeFirstOrThrow()).toEqual(before);
    const items = await database.owner.selectFrom('form_item').select(['question', 'template_version_id as version']).where('form_id', '=', formId).orderBy('question').execute();
    expect(items).toEqual([{ question: 1, version: one.versionId }, { question: 2, version: two.versionId }]);
    await expect(database.owner.updateTable('form').set({ title: 'Other' }).where('id', '=', formId).execute()).rejects.toThrow(/append-only/);
    await expect(database.app.deleteFrom('form_item').where('form_id', '=', formId).execute()).rejects.toThrow(/permission denied/);
  });

  it('cannot be scheduled once the exam is retired', async () => {
    const { examId, formId } = await makeForm(ivo, mara, [one]);
    const offered = async () => valueOf(await schedulableForms(ivo)).some((form) => form.id === formId);
    expect(await offered()).toBe(true);
    valueOf(await retireExam(ivo, examId));
    expect(await offered()).toBe(false);
  });
});

describe('who may', () => {
  it('finds nothing as anybody but an instructor, whether it exists or not', async () => {
    const { examId, revision } = await draft();
    for (const other of others) {
      const tries = await Promise.all([
        newExam(other, { title: 'Mine' }), examPage(other, examId), examLedger(other), choosableVersions(other), schedulableForms(other), previewPaper(other, examId, '1'),
        saveExam(other, examId, { title: 'X', revision, content: contentOf([one]) }), askForReview(other, examId, revision), approveExam(other, examId, { revision, note: '' }),
        returnExam(other, examId, 'x'), retireExam(other, examId),
      ]);
      for (const result of tries) expect(result).toMatchObject({ ok: false, code: 'not-found' });
    }
    expect(await examPage(ivo, 'nonsense')).toMatchObject({ ok: false, code: 'not-found' });
    expect(await examPage(ivo, '00000000-0000-4000-8000-000000000000')).toMatchObject({ ok: false, code: 'not-found' });
  });
});

describe('the preview', () => {
  it('is what a candidate sees: values, no key', async () => {
    const { examId } = await draft([one, two], { formulaSheet: '$E = V - I_a R_a$', materials: { calculator: 'any', formulaSheet: true, codeBook: false, other: '' } });
    const paper = valueOf(await previewPaper(ivo, examId, '7'));
    expect(paper.questions).toHaveLength(2);
    expect(paper.formulaSheetHtml).toContain('katex');
    expect(paper.sections).toMatchObject([{ first: 1, last: 2, marks: 6 }]);
    expect(JSON.stringify(paper)).not.toMatch(/"key"|"seed"|V \/ R|missteps/);
    expect(valueOf(await previewPaper(ivo, examId, '7'))).toEqual(paper);
    expect(valueOf(await previewPaper(ivo, examId, '8')).questions).not.toEqual(paper.questions);
  });
});
