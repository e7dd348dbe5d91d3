import { sql } from 'kysely';
import { simpleParser } from 'mailparser';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { admit } from '@/lib/candidates/commands';
import type { Context } from '@/lib/context';
import { retireExam } from '@/lib/exams/commands';
import type { PaperContent } from '@/lib/exams/paper';
import { sendMail } from '@/lib/mail/send';
import { keepIn, startSink } from '@/lib/mail/sink';
import { addCandidates, drawPapersAgain, removeCandidate, setSeats } from '@/lib/planning/candidates.commands';
import { cancelSitting, changeSitting, planSitting, renewNeeds } from '@/lib/planning/commands';
import { givensOf, keysOf, seedOf } from '@/lib/planning/draws';
import { inviteCandidates } from '@/lib/planning/invite';
import { drawPapers } from '@/lib/planning/jobs';
import { paperProgress, planOptions, sittingLedger, sittingPage } from '@/lib/planning/queries';
import { openCheckIn } from '@/lib/sittings/commands';
import { type Draw, drawTemplate } from '@/lib/templates/draw';
import { parseTemplate } from '@/lib/templates/parse';
import { loadLibrary } from '@/lib/bank/library';
import { openTestDatabase, type TestDatabase } from '../support/database';
import { makeForm, makeVersion, valueOf, type Version } from '../support/exams';
import { makeAccount } from '../support/room';

type Person = Context & { id: string };
let database: TestDatabase;
let ivo: Person;
let mara: Person;
let piet: Person;
let clerk: Person;
let students: Person[];
let versions: Version[];
let formId: string;
let examId: string;
let classId: string;

beforeAll(async () => {
  database = await openTestDatabase();
  const { owner, app } = database;
  await database.setClock(new Date('2026-12-01T15:00:00Z'));
  await owner.updateTable('school').set({ name: 'Kettle Ridge', settings: JSON.stringify({ zone: 'America/Edmonton' }) }).execute();
  [ivo, mara] = [await makeAccount(owner, app, 'Ivo', 'instructor'), await makeAccount(owner, app, 'Mara', 'instructor')];
  piet = await makeAccount(owner, app, 'Piet', 'proctor');
  clerk = await makeAccount(owner, app, 'Rea', 'registrar');
  students = [];
  for (const name of ['Ada', 'Ben', 'Cleo', 'Dov']) students.push(await makeAccount(owner, app, name, 'student'));
  versions = [await makeVersion(owner, ivo.id, { decider: mara.id }), await makeVersion(owner, ivo.id, { decider: mara.id })];
  ({ formId, examId } = await makeForm(ivo, mara, versions));
  const term = await owner.insertInto('term').values({ name: 'Autumn', starts_on: '2026-09-01', ends_on: '2026-12-20' }).returning('id').executeTakeFirstOrThrow();
  classId = (await owner.insertInto('class').values({ term_id: term.id, name: 'E2-A' }).returning('id').executeTakeFirstOrThrow()).id;
  await owner.insertInto('class_instructor').values({ class_id: classId, account_id: ivo.id }).execute();
  await owner.insertInto('enrolment').values(students.slice(0, 3).map((student) => ({ class_id: classId, account_id: student.id, since: '2026-09-01' }))).execute();
});
afterAll(() => database.close());

const plan = (change = {}) => ({
  formId, classId, title: 'Machines, period 2', room: '114', opensAt: '2026-12-08T08:30', startsAt: '2026-12-08T09:00', latestStartAt: '2026-12-08T09:30', proctors: [piet.id], ...change,
});
const planned = async (change = {}) => valueOf(await planSitting(ivo, plan(change))).sittingId;
const draw = (sittingId: string) => drawPapers(database.app, { sittingId });
const page = async (sittingId: string, who: Context = ivo) => valueOf(await sittingPage(who, sittingId));
const accommodate = (account: Person, given: object, ended = false) =>
  database.owner.insertInto('accommodation').values({ account_id: account.id, since: '2026-09-01', given_by: clerk.id, reason: 'not to be seen', ...given, ...(ended ? { ended_at: new Date() } : {}) }).execute();
async function drawsOf(sittingId: string) {
  const rows = await database.owner
    .selectFrom('paper_key as k').innerJoin('candidate as c', 'c.id', 'k.candidate_id').where('c.sitting_id', '=', sittingId)
    .select(['k.candidate_id', 'c.account_id', 'k.question', 'k.seed', 'k.draw']).orderBy('k.candidate_id').orderBy('k.question').execute();
  return rows.map((row) => ({ ...row, draw: row.draw as unknown as Draw }));
}

describe('planning', () => {
  it('makes everybody enrolled a candidate, seated by name, at the school zone of the start', async () => {
    const sitting = await page(await planned());
    expect(sitting.startsAt.toISOString()).toBe('2026-12-08T16:00:00.000Z');
    expect(sitting.candidates.map(({ name, seat, need, secondsAllowed }) => [name, seat, need, secondsAllowed])).toEqual([['Ada', 'A1', '', 7200], ['Ben', 'A2', '', 7200], ['Cleo', 'A3', '', 7200]]);
    expect(sitting.papers.state).toBe('drawing');
    const { rows } = await sql<{ task: string }>`select task_identifier as task from graphile_worker.jobs where key = ${`draw-papers ${sitting.id}`}`.execute(database.owner);
    expect(rows).toEqual([{ task: 'draw-papers' }]);
  });

  it('gives the accommodations of that day: 120 min and 25 % end at 150:00, and never the reason', async () => {
    const [ada, ben, cleo] = students as [Person, Person, Person];
    await accommodate(ada, { extra_percent: 25 });
    await accommodate(ben, { extra_minutes: 10, rest_minutes: 15, large_print: true, until: '2026-12-08' });
    await accommodate(cleo, { extra_percent: 50, until: '2026-12-07' });
    await accommodate(cleo, { separate_room: true, extra_percent: 33.3 }, true);
    const id = await planned();
    const before = await page(id);
    expect(before.candidates.map((row) => [row.secondsAllowed, row.restSeconds, row.need])).toEqual([[9000, 0, '+25 %'], [7800, 900, '+10 min, rest 15 min, large print'], [7200, 0, '']]);
    expect(JSON.stringify(await page(id, piet))).not.toContain('not to be seen');
    await database.owner.updateTable('accommodation').set({ ended_at: new Date() }).where('account_id', '=', ada.id).execute();
    expect((await page(id)).changedNeeds).toBe(1);
    valueOf(await renewNeeds(ivo, id));
    expect((await page(id)).candidates[0]).toMatchObject({ secondsAllowed: 7200, need: '' });
    // The day before, Cleo's half as long again is still valid.
    valueOf(await changeSitting(ivo, id, { title: 'Earlier', room: '9', opensAt: '2026-12-07T08:30', startsAt: '2026-12-07T09:00', latestStartAt: '2026-12-07T09:30', proctors: [piet.id] }));
    expect((await page(id)).candidates[2]).toMatchObject({ secondsAllowed: 10_800, need: '+50 %' });
    await database.owner.deleteFrom('accommodation').execute();
  });

  it('refuses a time that is over, a class of another, a proctor who is none or sits it, and a retired exam', async () => {
    expect(await planSitting(ivo, plan({ opensAt: '2026-11-01T08:00', startsAt: '2026-11-01T09:00', latestStartAt: '2026-11-01T09:00' }))).toMatchObject({ code: 'past', field: 'latestStartAt' });
    expect(await planSitting(mara, plan())).toMatchObject({ code: 'class' });
    expect(await planSitting(ivo, plan({ proctors: [students[3]!.id] }))).toMatchObject({ code: 'proctor', field: 'proctors' });
    await database.owner.insertInto('account_role').values({ account_id: students[0]!.id, role: 'proctor' }).execute();
    expect(await planSitting(ivo, plan({ proctors: [students[0]!.id] }))).toMatchObject({ code: 'proctor-is-candidate' });
    await database.owner.deleteFrom('account_role').where('account_id', '=', students[0]!.id).where('role', '=', 'proctor').execute();
    const other = await makeForm(ivo, mara, versions);
    valueOf(await retireExam(ivo, other.examId));
    expect(await planSitting(ivo, plan({ formId: other.formId }))).toMatchObject({ code: 'form', field: 'formId' });
    expect(examId).not.toBe(other.examId);
  });
});

describe('drawing', () => {
  it('stores whole papers once, however often it runs', async () => {
    const id = await planned();
    expect(await draw(id)).toEqual({ ok: true, value: { drawn: 3 } });
    const papers = () => database.owner.selectFrom('paper as p').innerJoin('candidate as c', 'c.id', 'p.candidate_id').where('c.sitting_id', '=', id).selectAll('p').orderBy('p.candidate_id').execute();
    const before = [await papers(), await drawsOf(id)];
    expect(await draw(id)).toEqual({ ok: true, value: { drawn: 0 } });
    expect([await papers(), await drawsOf(id)]).toEqual(before);
    expect(valueOf(await paperProgress(ivo, id))).toEqual({ papers: 'drawn', drawn: 3, of: 3, says: '' });
    const content = before[0]?.[0] as { content: unknown; questions: number; parts: number };
    expect(content).toMatchObject({ questions: 2, parts: 4 });
    expect((content.content as PaperContent).marks).toBe(6);
    expect(JSON.stringify(content.content)).not.toMatch(/"key"|"seed"|V \/ R|missteps/);
  });

  it('draws each paper once when two workers are at it', async () => {
    const id = await planned();
    const results = await Promise.all([draw(id), draw(id)]);
    expect(results.reduce((sum, result) => sum + valueOf(result).drawn, 0)).toBe(3);
    expect(await drawsOf(id)).toHaveLength(6);
  });

  it('draws the same again from the stored seed, and that seed from the secret', async () => {
    const id = await planned();
    await draw(id);
    const { secret } = await database.owner.selectFrom('sitting').select('secret').where('id', '=', id).executeTakeFirstOrThrow();
    const library = loadLibrary();
    for (const row of await drawsOf(id)) {
      const version = versions[row.question - 1] as Version;
      const { text } = await database.owner.selectFrom('template_version').select('text').where('id', '=', version.versionId).executeTakeFirstOrThrow();
      const parsed = parseTemplate(text, library);
      if (!parsed.ok) throw new Error('unread');
      expect(row.seed.split('~')[0]).toBe(seedOf(secret, row.candidate_id, row.question));
      expect(valueOf(drawTemplate(parsed.template, row.seed, { locale: 'en-CA' }))).toEqual(row.draw);
    }
  });

  it('gives no two neighbours the same answers, and no student the same values twice', async () => {
    const first = await planned();
    await draw(first);
    const again = await planned({ title: 'Rewrite' });
    await draw(again);
    const all = [...(await drawsOf(first)), ...(await drawsOf(again))];
    for (const question of [1, 2]) {
      const inFirst = (await drawsOf(first)).filter((row) => row.question === question).map((row) => keysOf(row.draw));
      expect(new Set(inFirst).size).toBe(3);
      for (const student of students.slice(0, 3)) {
        const own = all.filter((row) => row.account_id === student.id && row.question === question);
        expect(new Set(own.map((row) => keysOf(row.draw))).size).toBe(own.length);
        expect(new Set(own.map((row) => givensOf(row.draw))).size).toBe(own.length);
      }
    }
  });

  it('goes past draws that a student had, as long as the template has others', async () => {
    const few = (values: string) => `template: few-values
language: 1
title: Current in a resistance
area: dc-motors
level: 2
minutes: 5
cautions: [live-test]
given:
  V: { label: Supply voltage, unit: V, choose: ${values} }
stem: A resistance of 10 Ω is connected to a {{V}} supply.
parts:
  - { part: a, kind: number, ask: Find the current., key: V / 10, unit: A, marks: 3, trade-constant: 10 ohm are stated in the stem }
solution: $I = {{part.a}}$
`;
    const version = await makeVersion(database.owner, ivo.id, { decider: mara.id, text: few('[100, 110, 120, 130, 140, 150]') });
    const form = await makeForm(ivo, mara, [version]);
    const given: string[] = [];
    for (let round = 0; round < 2; round += 1) {
      const id = await planned({ formId: form.formId });
      expect(valueOf(await draw(id)).drawn).toBe(3);
      given.push(...(await drawsOf(id)).map((row) => `${row.account_id} ${keysOf(row.draw)}`));
    }
    expect(new Set(given).size).toBe(6);
  });

  it('says on the page why papers cannot be drawn, and draws them once that is put right', async () => {
    const id = await planned();
    const { rows } = await sql<{ digests: string }>`select digests::text from template_version where id = ${versions[0]!.versionId}`.execute(database.owner);
    const rewrite = async (digests: string) => {
      await sql`alter table template_version disable trigger unchangeable`.execute(database.owner);
      await sql`update template_version set digests = ${digests}::jsonb where id = ${versions[0]!.versionId}`.execute(database.owner);
      await sql`alter table template_version enable trigger unchangeable`.execute(database.owner);
    };
    await rewrite('{"caution:live-test": "other"}');
    expect(await draw(id)).toMatchObject({ ok: false, code: 'library-changed' });
    expect((await page(id)).readiness.find((line) => line.code === 'papers')).toMatchObject({ ready: false, says: expect.stringContaining('caution live-test') as string });
    await rewrite(rows[0]!.digests);
    valueOf(await drawPapersAgain(ivo, id));
    expect(valueOf(await draw(id)).drawn).toBe(3);
  });
});

describe('the list', () => {
  it('takes a late student with a free seat and a paper of their own, and lets one go with an unseen paper', async () => {
    const id = await planned();
    await draw(id);
    const dov = students[3] as Person;
    expect(await addCandidates(ivo, id, [dov.id])).toMatchObject({ code: 'not-enrolled' });
    await database.owner.insertInto('enrolment').values({ class_id: classId, account_id: dov.id, since: '2026-12-01' }).execute();
    expect((await page(id)).missing.map((student) => student.name)).toEqual(['Dov']);
    expect(valueOf(await addCandidates(ivo, id, [dov.id])).added).toBe(1);
    expect(valueOf(await addCandidates(ivo, id, [dov.id])).added).toBe(0);
    expect((await page(id)).papers.state).toBe('drawing');
    expect(valueOf(await draw(id)).drawn).toBe(1);
    const ada = (await page(id)).candidates[0]!;
    valueOf(await removeCandidate(ivo, id, ada.id));
    const after = await page(id);
    expect(after.candidates.map((row) => [row.name, row.seat])).toEqual([['Ben', 'A2'], ['Cleo', 'A3'], ['Dov', 'A4']]);
    expect(after.papers.state).toBe('drawn');
    await database.owner.deleteFrom('enrolment').where('account_id', '=', dov.id).execute();
  });

  it('refuses a seat given twice, and a seat for a candidate of another sitting', async () => {
    const id = await planned();
    const [ada, ben] = (await page(id)).candidates;
    expect(await setSeats(ivo, id, [{ candidateId: ada!.id, seat: 'A2' }])).toMatchObject({ code: 'seat-taken' });
    valueOf(await setSeats(ivo, id, [{ candidateId: ada!.id, seat: 'A2' }, { candidateId: ben!.id, seat: 'A1' }]));
    expect((await page(id)).candidates.map((row) => row.seat)).toEqual(['A2', 'A1', 'A3']);
    const other = (await page(await planned())).candidates[0]!;
    expect(await setSeats(ivo, id, [{ candidateId: other.id, seat: 'Z1' }])).toMatchObject({ code: 'not-found' });
  });

  it('stands still once check-in is open: the database itself keeps the papers', async () => {
    const id = await planned();
    await draw(id);
    await database.setClock(new Date('2026-12-08T15:45:00Z'));
    expect(await openCheckIn(piet, id)).toEqual({ ok: true, value: { state: 'check-in' } });
    const candidate = (await page(id)).candidates[0]!;
    expect(await removeCandidate(ivo, id, candidate.id)).toMatchObject({ code: 'state' });
    await expect(database.app.deleteFrom('paper').where('candidate_id', '=', candidate.id).execute()).rejects.toThrow(/unchangeable/);
    expect(await admit(piet, id, [candidate.id])).toMatchObject({ ok: true });
    valueOf(await cancelSitting(ivo, id, 'flood'));
    expect((await page(id)).candidates[0]?.state).toBe('withdrawn');
    await database.setClock(new Date('2026-12-01T15:00:00Z'));
  });

  it('is called off with a reason, and stays', async () => {
    const id = await planned();
    expect(await cancelSitting(ivo, id, '  ')).toMatchObject({ code: 'reason' });
    valueOf(await cancelSitting(ivo, id, 'The heating is broken.'));
    expect(await page(id)).toMatchObject({ state: 'cancelled', mayPlan: false });
    expect(await draw(id)).toEqual({ ok: true, value: { drawn: 0 } });
  });
});

describe('inviting', () => {
  it('mails time, room and a calendar entry once a plan, and again when the plan changed', async () => {
    const id = await planned();
    expect(valueOf(await inviteCandidates(ivo, id))).toEqual({ queued: 3, before: 0, withoutAddress: 0 });
    expect(valueOf(await inviteCandidates(ivo, id))).toEqual({ queued: 0, before: 3, withoutAddress: 0 });
    const sink = await startSink({ port: 0, keep: keepIn(database.app) });
    const mails = await database.owner.selectFrom('mail').select('id').where('sitting_id', '=', id).execute();
    for (const mail of mails) await sendMail(database.app, sink.url, mail.id);
    await sink.close();
    const received = await database.owner.selectFrom('sink_mail').selectAll().execute();
    expect(received).toHaveLength(3);
    const mail = await simpleParser(received[0]!.raw);
    expect(mail.text).toContain('Tuesday 8 December 2026, 09:00 Mountain Standard Time');
    expect(mail.text).toContain('https://exams.example.org/today');
    expect(mail.attachments[0]?.content.toString()).toMatch(/DTSTART:20261208T160000Z\r\nDTEND:20261208T180000Z/);
    expect((await page(id)).candidates.map((row) => row.mail)).toEqual(['accepted', 'accepted', 'accepted']);
    valueOf(await changeSitting(ivo, id, { title: 'Machines, period 2', room: '115', opensAt: '2026-12-08T08:30', startsAt: '2026-12-08T09:00', latestStartAt: '2026-12-08T09:30', proctors: [] }));
    expect(valueOf(await inviteCandidates(ivo, id)).queued).toBe(3);
  });
});

describe('who may', () => {
  it('shows a sitting to its class’s instructor, its proctors and the registrar; changes it as the instructor alone', async () => {
    const id = await planned();
    const other = await makeAccount(database.owner, database.app, 'Other proctor', 'proctor');
    const sees = async (who: Context) => [(await sittingPage(who, id)).ok, ((list) => list.ok && list.value.some((row) => row.id === id))(await sittingLedger(who))];
    for (const who of [ivo, piet, clerk]) expect(await sees(who)).toEqual([true, true]);
    for (const who of [mara, other, students[0] as Person]) expect(await sees(who)).toEqual([false, false]);
    const { proctors: _, formId: __, classId: ___, ...rest } = plan();
    for (const who of [mara, piet, clerk, other, students[0] as Person]) {
      const tries = await Promise.all([
        changeSitting(who, id, { ...rest, proctors: [] }), renewNeeds(who, id), cancelSitting(who, id, 'x'), setSeats(who, id, []), addCandidates(who, id, []),
        removeCandidate(who, id, id), inviteCandidates(who, id), drawPapersAgain(who, id),
      ]);
      for (const result of tries) expect(result).toMatchObject({ ok: false, code: 'not-found' });
    }
    expect(valueOf(await planOptions(mara)).classes).toEqual([]);
    for (const who of [piet, clerk, students[0] as Person]) expect(await planOptions(who)).toMatchObject({ code: 'not-found' });
    expect((await page(id, piet)).mayRun).toBe(true);
    expect((await page(id, clerk)).mayPlan).toBe(false);
  });
});
