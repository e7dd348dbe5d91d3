import { sql } from 'kysely';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { decideClaim, moderateSitting, overrideMark, releaseResults, sealResults, withholdResult } from '@/lib/results/commands';
import { markPaper, markSitting } from '@/lib/results/marking';
import type { Breakdown } from '@/lib/results/model';
import { verifyRows } from '@/lib/results/verify';
import { openTestDatabase, type TestDatabase } from '../support/database';
import { valueOf } from '../support/exams';
import { closed, rightAnswers, startedSitting, write, type Writer, type Written } from '../support/results';

let database: TestDatabase;
let written: Written;
let ada: Writer;
let ben: Writer;
let cleo: Writer;
let dov: Writer;

/** Part a of the motor question 40 % too large, the rest worked on rightly from that value. */
async function slipOf(writer: Writer): Promise<Record<string, string>> {
  const given = (await written.draws(writer.candidateId))[0]!.given;
  const value = (name: string) => Number(given[name]!.value);
  const armature = 1.4 * (value('IL') - value('V') / value('Rf'));
  const emf = value('V') - armature * value('Ra');
  const flux = value('w') / 100;
  const speed = (value('n1') * (value('V') - (armature / flux) * value('Ra'))) / emf / flux;
  return { a: `${armature.toFixed(2)} A`, b: `${emf.toFixed(1)} V`, c: `${speed.toFixed(0)} rpm` };
}

beforeAll(async () => {
  database = await openTestDatabase();
  written = await startedSitting(database, ['Abara, Adaeze', 'Brandt, Ben', 'Castellan, Cleo', 'Dufresne, Dov']);
  [ada, ben, cleo, dov] = written.writers as [Writer, Writer, Writer, Writer];
  await write(database, ada, [{ a: '1 A' }]);
  await write(database, ada, await rightAnswers(written, ada));
  await write(database, ben, [await slipOf(ben), (await rightAnswers(written, ben))[1]!]);
  await write(database, cleo, [{ a: 'about that much' }]);
});
afterAll(() => database.close());

const newest = (writer: Writer) => database.owner.selectFrom('result').selectAll().where('candidate_id', '=', writer.candidateId).orderBy('issue', 'desc').limit(1).executeTakeFirst();
const marksOf = (writer: Writer) => database.owner.selectFrom('mark').selectAll().where('candidate_id', '=', writer.candidateId).orderBy('question').orderBy('part').orderBy('issue').execute();
const change = (writer: Writer, more = {}) => ({ candidateId: writer.candidateId, question: 1, part: 'a', issue: 1, awarded: 1, reason: 'Unit and value are right.', ...more });

describe('marking', () => {
  it('waits for the end of the paper', async () => {
    expect(await markPaper(database.app, ada.candidateId)).toBe('waiting');
    expect(await newest(ada)).toBeUndefined();
  });

  it('marks every paper from the last answers, absent candidates among the results', async () => {
    await closed(written);
    expect(await markSitting(database.app, written.sittingId)).toEqual({ marked: 4, unchanged: 0, waiting: 0, settled: 0 });
    expect(await newest(ada)).toMatchObject({ total: 12, of: 12, percent: 100, outcome: 'pass', state: 'provisional', issue: 1, made_by: null });
    expect((await marksOf(ada)).map((mark) => [mark.verdict, mark.rule])).toEqual(Array.from({ length: 7 }, () => ['correct', 'key']));
    expect(await newest(cleo)).toMatchObject({ total: 0, outcome: 'not passed' });
    expect((await marksOf(cleo)).map((mark) => mark.verdict)).toEqual(['unread', 'blank', 'blank', 'blank', 'blank', 'blank', 'blank']);
    expect(await newest(dov)).toMatchObject({ total: 0, of: 12, outcome: 'absent' });
    expect(await marksOf(dov)).toEqual([]);
  });

  it('follows a slip through: it costs its own marks and no others, and the result says by section and area', async () => {
    expect((await marksOf(ben)).slice(0, 3).map((mark) => [mark.part, mark.awarded, mark.verdict, mark.rule])).toEqual([
      ['a', 0, 'wrong', 'no-match'], ['b', 2, 'carried', 'follow-through'], ['c', 3, 'carried', 'follow-through'],
    ]);
    const result = await newest(ben);
    // 11 of 12 is 91.666…, to one decimal; the motor question alone 5 of 6.
    expect(result).toMatchObject({ total: 11, percent: 91.7, outcome: 'pass' });
    const { sections, areas } = result!.breakdown as unknown as Breakdown;
    expect(sections.map(({ title, awarded, of, percent }) => [title, awarded, of, percent])).toEqual([['Motors', 5, 6, 83.3], ['Generators', 6, 6, 100]]);
    expect(areas.map(({ area, awarded }) => [area, awarded])).toEqual([['dc-motors', 5], ['dc-generators', 6]]);
    expect(result!.rule).toMatchObject({ rounding: 'tenth', rules: [{ wanted: 70, had: 91.7, met: true }, { says: 'Motors', wanted: 50, had: 83.3, met: true }] });
  });

  it('writes nothing when it comes out the same again, also when two workers mark at once', async () => {
    const count = () => sql<{ n: number }>`select (select count(*) from mark) + (select count(*) from result) + (select count(*) from event) as n`.execute(database.owner);
    const before = (await count()).rows;
    expect(await markSitting(database.app, written.sittingId)).toMatchObject({ unchanged: 4, marked: 0 });
    await Promise.all([markPaper(database.app, ben.candidateId), markPaper(database.app, ben.candidateId)]);
    expect((await count()).rows).toEqual(before);
  });
});

describe('decisions', () => {
  it('counts an answer after the end only when it was taken, by who may decide', async () => {
    const { owner } = database;
    const right = (await rightAnswers(written, cleo))[1]!;
    const claim = { candidate_id: cleo.candidateId, question: 2, part: 'a', answer: right.a!, sequence: 900_001, typed_at: new Date() };
    await owner.insertInto('claim').values([claim, { ...claim, part: 'b', answer: right.b!, sequence: 900_002 }]).execute();
    const decision = { candidateId: cleo.candidateId, question: 2, part: 'a', sequence: 900_001, decision: 'taken' as const, reason: 'The network was down.' };
    for (const stranger of [written.mara, written.clerk, cleo.person]) expect(await decideClaim(stranger, decision)).toMatchObject({ ok: false, code: 'not-found' });
    expect(await moderateSitting(written.ivo, written.sittingId)).toMatchObject({ ok: false, code: 'conditions-open', says: '2 answers that came after the end are not decided.' });
    valueOf(await decideClaim(written.piet, decision));
    valueOf(await decideClaim(written.ivo, { ...decision, part: 'b', sequence: 900_002, decision: 'left out' }));
    expect(await decideClaim(written.piet, decision)).toMatchObject({ ok: false, code: 'decided' });
    expect((await newest(cleo))).toMatchObject({ issue: 2, total: 1, state: 'provisional' });
    expect((await marksOf(cleo)).filter((mark) => mark.question === 2).map((mark) => [mark.part, mark.issue, mark.verdict])).toEqual([['a', 1, 'blank'], ['a', 2, 'correct'], ['b', 1, 'blank'], ['c', 1, 'blank'], ['d', 1, 'blank']]);
  });

  it('lets an instructor of the class override a mark with a reason; result and log follow, the old mark stays', async () => {
    for (const stranger of [written.mara, written.piet, written.clerk, ben.person]) expect(await overrideMark(stranger, change(ben))).toMatchObject({ ok: false, code: 'not-found' });
    expect(await overrideMark(written.ivo, change(ben, { awarded: 1.5 }))).toMatchObject({ ok: false, code: 'too-many', field: 'awarded' });
    valueOf(await overrideMark(written.ivo, change(ben, { awarded: 0.5 })));
    expect(await overrideMark(written.ivo, change(ben))).toMatchObject({ ok: false, code: 'changed-since' });
    expect((await marksOf(ben)).filter((mark) => mark.question === 1 && mark.part === 'a').map((mark) => [mark.issue, mark.awarded, mark.rule, mark.marker_id])).toEqual([
      [1, 0, 'no-match', null], [2, 0.5, 'person', written.ivo.id],
    ]);
    expect(await newest(ben)).toMatchObject({ issue: 2, total: 11.5, made_by: written.ivo.id, why: 'Unit and value are right.' });
    expect(await markPaper(database.app, ben.candidateId)).toBe('unchanged');
    expect(await verifyRows(database.app)).toEqual([]);
  });
});

describe('moderating, releasing, sealing', () => {
  it('goes step by step, each by its own people, and a withheld result stays behind', async () => {
    const { ivo, clerk, mara, sittingId } = written;
    expect(await releaseResults(ivo, sittingId)).toMatchObject({ ok: false, code: 'conditions-open' });
    for (const stranger of [mara, written.piet, clerk, ada.person]) expect(await moderateSitting(stranger, sittingId)).toMatchObject({ ok: false, code: 'not-found' });
    valueOf(await withholdResult(ivo, { candidateId: cleo.candidateId, withheld: true, reason: 'An incident is being looked into.' }));
    expect(valueOf(await moderateSitting(ivo, sittingId))).toEqual({ moved: 4 });
    expect(await releaseResults(clerk, sittingId)).toMatchObject({ ok: false, code: 'not-found' });
    expect(valueOf(await releaseResults(ivo, sittingId))).toEqual({ moved: 3 });
    expect(await newest(cleo)).toMatchObject({ state: 'moderated', withheld: true });
    expect(await markPaper(database.app, ada.candidateId)).toBe('settled');
    expect(await sealResults(clerk, sittingId)).toMatchObject({ ok: false, code: 'conditions-open' });
    valueOf(await withholdResult(ivo, { candidateId: cleo.candidateId, withheld: false, reason: 'Nothing was found.' }));
    expect(valueOf(await releaseResults(ivo, sittingId))).toEqual({ moved: 1 });
    expect(await sealResults(ivo, sittingId)).toMatchObject({ ok: false, code: 'not-found' });
    expect(valueOf(await sealResults(clerk, sittingId))).toEqual({ moved: 4 });
    expect(await overrideMark(ivo, change(ada))).toMatchObject({ ok: false, code: 'wrong-state' });
  });

  it('keeps every issue: nothing can be changed through the application, and a row changed behind it is named', async () => {
    await expect(database.app.updateTable('mark').set({ awarded: 1 }).where('candidate_id', '=', cleo.candidateId).execute()).rejects.toThrow(/permission denied/);
    await expect(database.owner.updateTable('result').set({ total: 11 }).where('candidate_id', '=', cleo.candidateId).execute()).rejects.toThrow(/append-only/);
    expect(await verifyRows(database.app)).toEqual([]);
    await sql`alter table mark disable trigger append_only`.execute(database.owner);
    await sql`alter table result disable trigger append_only`.execute(database.owner);
    await database.owner.updateTable('mark').set({ awarded: 1 }).where('candidate_id', '=', cleo.candidateId).where('question', '=', 1).where('part', '=', 'a').execute();
    await database.owner.deleteFrom('result').where('candidate_id', '=', dov.candidateId).where('issue', '=', 1).execute();
    const faults = await verifyRows(database.app);
    expect(faults.map(({ candidate, row }) => [candidate, row]).sort()).toEqual([[cleo.candidateId, 'mark 1 a 1'], [dov.candidateId, 'result 1']].sort());
  });
});
