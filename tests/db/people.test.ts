import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { endAccommodation, giveAccommodation } from '@/lib/accommodations/commands';
import { listAccommodations } from '@/lib/accommodations/queries';
import { endEnrolments, enrol, saveClass, saveTerm, setTermState } from '@/lib/classes/commands';
import { listClasses, listOwnClasses, listTerms, readClass } from '@/lib/classes/queries';
import type { Context } from '@/lib/context';
import { changePerson, closeAccount, inviteAccount, reopenAccount, sendFreshLink, setRoles } from '@/lib/people/commands';
import { listPeople, readPerson } from '@/lib/people/queries';
import type { Result } from '@/lib/result';
import { dropRoster, previewRoster, takeRoster } from '@/lib/rosters/commands';
import { readPreview } from '@/lib/rosters/queries';
import { makeSlips } from '@/lib/slips/commands';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';
import { firstRegistrar, newPerson, type Person } from '@/tests/support/people';

let database: TestDatabase;
let registrar: Person;
let student: Person;
let instructor: Person;
let proctor: Person;
let termId: string;
let classId: string;

const idOf = (result: Result<{ id: string }>): string => {
  if (!result.ok) throw new Error(result.says);
  return result.value.id;
};

beforeAll(async () => {
  database = await openTestDatabase();
  registrar = await firstRegistrar(database.app);
  student = await newPerson(registrar, ['student'], { name: 'Noémie Bélanger', email: 'noemie@school.test', learnerNumber: 'KR-1' });
  instructor = await newPerson(registrar, ['instructor']);
  proctor = await newPerson(registrar, ['proctor']);
  termId = idOf(await saveTerm(registrar.context, null, { name: 'Autumn', startsOn: '2026-09-01', endsOn: '2026-12-18' }));
  classId = idOf(await saveClass(registrar.context, null, { termId, name: 'EL2-B', title: '', instructorIds: [instructor.id] }));
  await enrol(registrar.context, classId, [student.id]);
});
afterAll(() => database.close());

const accommodation = { extraPercent: 25, extraMinutes: 0, restMinutes: 15, largePrint: false, separateRoom: false, reason: 'Doctor', since: '2026-12-01', until: '' };
const csv = (text: string) => new TextEncoder().encode(text);
const roster = (text: string, more: { makeClasses?: boolean; invite?: boolean } = {}) => ({ fileName: 'roster.csv', bytes: csv(text), termId, makeClasses: false, invite: false, ...more });

describe('policy', () => {
  const doors: [string, (context: Context) => Promise<Result<unknown>>][] = [
    ['list people', (context) => listPeople(context)],
    ['read a person', (context) => readPerson(context, registrar.id)],
    ['invite', (context) => inviteAccount(context, { name: 'A', sortName: '', email: 'a@school.test', learnerNumber: '', roles: ['registrar'] })],
    ['change a person', (context) => changePerson(context, student.id, { name: 'B', sortName: '', email: '', learnerNumber: 'X' })],
    ['set roles', (context) => setRoles(context, student.id, ['registrar'])],
    ['close', (context) => closeAccount(context, student.id)],
    ['reopen', (context) => reopenAccount(context, student.id)],
    ['send a link', (context) => sendFreshLink(context, student.id)],
    ['list terms', (context) => listTerms(context)],
    ['save a term', (context) => saveTerm(context, termId, { name: 'X', startsOn: '2026-01-01', endsOn: '2026-01-02' })],
    ['end a term', (context) => setTermState(context, termId, 'ended')],
    ['list classes', (context) => listClasses(context)],
    ['read a class', (context) => readClass(context, classId)],
    ['save a class', (context) => saveClass(context, classId, { termId, name: 'X', title: '', instructorIds: [] })],
    ['enrol', (context) => enrol(context, classId, [student.id])],
    ['end an enrolment', (context) => endEnrolments(context, classId, [student.id])],
    ['give an accommodation', (context) => giveAccommodation(context, student.id, accommodation)],
    ['list accommodations', (context) => listAccommodations(context, student.id)],
    ['make slips', (context) => makeSlips(context, [student.id])],
    ['preview a roster', (context) => previewRoster(context, roster('Name,Number\nA,1\n'))],
  ];
  it.each(doors)('students, instructors, proctors, nobody and the system cannot: %s', async (_, knock) => {
    const nobody: Context = { db: database.app, actor: { kind: 'account', id: student.id, name: 'N', roles: new Set() } };
    const system: Context = { db: database.app, actor: { kind: 'system', name: 'job' } };
    for (const context of [student.context, instructor.context, proctor.context, nobody, system]) expect(await knock(context)).toMatchObject({ ok: false, code: 'not-found' });
  });

  it('what does not exist answers as what is forbidden does, also for ids that are none', async () => {
    for (const id of ['00000000-0000-4000-8000-000000000000', "x'; drop table account", '']) {
      expect(await readPerson(registrar.context, id)).toMatchObject({ code: 'not-found' });
      expect(await closeAccount(registrar.context, id)).toMatchObject({ code: 'not-found' });
      expect(await readClass(registrar.context, id)).toMatchObject({ code: 'not-found' });
    }
  });

  it('an instructor sees the classes taught and no other', async () => {
    const other = await newPerson(registrar, ['instructor']);
    const names = async (context: Context) => {
      const own = await listOwnClasses(context);
      return own.ok ? own.value.map((one) => one.name) : own.code;
    };
    expect(await names(instructor.context)).toEqual(['EL2-B']);
    expect(await names(other.context)).toEqual([]);
    expect(await names(student.context)).toBe('not-found');
  });

  it("another registrar's preview is not found", async () => {
    const second = await newPerson(registrar, ['registrar']);
    const id = idOf(await previewRoster(registrar.context, roster('Name,Number\nPreviewed,PR-1\n')));
    expect(await readPreview(second.context, id)).toMatchObject({ code: 'not-found' });
    expect(await takeRoster(second.context, id)).toMatchObject({ code: 'not-found' });
    expect(await dropRoster(registrar.context, id)).toMatchObject({ ok: true });
    await closeAccount(registrar.context, second.id);
  });
});

describe('accounts', () => {
  it('two registrars who close each other at once leave one', async () => {
    const second = await newPerson(registrar, ['registrar']);
    const answers = await Promise.all([closeAccount(registrar.context, second.id), closeAccount({ ...second.context }, registrar.id)]);
    expect(answers.filter((answer) => answer.ok)).toHaveLength(1);
    const refused = answers.find((answer) => !answer.ok);
    expect(refused).toMatchObject({ code: 'last-registrar' });
    if (!answers[0]?.ok) await reopenAccount(second.context, registrar.id);
    const open = await database.owner.selectFrom('account').innerJoin('account_role', 'account_id', 'id').where('role', '=', 'registrar').where('state', '=', 'active').select('id').execute();
    expect(open).toHaveLength(answers[0]?.ok ? 1 : 2);
    if (!answers[0]?.ok) await closeAccount(registrar.context, second.id);
  });

  it('the last registrar keeps the role', async () => {
    expect(await setRoles(registrar.context, registrar.id, ['instructor'])).toMatchObject({ code: 'last-registrar' });
  });

  it('the same person added twice at once becomes one, and the other is told whose e-mail it is', async () => {
    const add = () => inviteAccount(registrar.context, { name: 'Twin', sortName: '', email: 'Twin@School.test', learnerNumber: '', roles: ['student'] });
    const answers = await Promise.all([add(), add(), add()]);
    expect(answers.filter((answer) => answer.ok)).toHaveLength(1);
    expect(answers.filter((answer) => !answer.ok && answer.code === 'email-taken' && answer.field === 'email')).toHaveLength(2);
  });

  it('a changed name keeps the old one in an erasable note, and the log holds no words', async () => {
    const person = await newPerson(registrar, ['student'], { name: 'Before Married', learnerNumber: 'NM-1' });
    await changePerson(registrar.context, person.id, { name: 'After Married', sortName: '', email: '', learnerNumber: 'NM-1' });
    const page = await readPerson(registrar.context, person.id);
    expect(page.ok && page.value.events[0]).toMatchObject({ kind: 'account.changed', note: 'Before Married → After Married' });
    const events = await database.owner.selectFrom('event').where('subject_id', '=', person.id).selectAll().execute();
    expect(JSON.stringify(events)).not.toContain('Married');
  });

  it('a header of mail cannot be smuggled in by a name or an address', async () => {
    const add = (name: string, email: string) => inviteAccount(registrar.context, { name, sortName: '', email, learnerNumber: '', roles: ['student'] });
    expect(await add('Eve\r\nBcc: all@school.test', 'eve@school.test')).toMatchObject({ code: 'invalid', field: 'name' });
    expect(await add('Eve', 'eve@school.test\r\nBcc: all@school.test')).toMatchObject({ code: 'invalid', field: 'email' });
  });
});

describe('enrolment and accommodations', () => {
  it('takes students only, once, and lets those who left come back', async () => {
    expect(await enrol(registrar.context, classId, [instructor.id])).toMatchObject({ code: 'wrong-role' });
    expect(await enrol(registrar.context, classId, [student.id])).toMatchObject({ ok: true, value: { enrolled: 0 } });
    expect(await endEnrolments(registrar.context, classId, [student.id])).toMatchObject({ ok: true, value: { ended: 1 } });
    expect(await endEnrolments(registrar.context, classId, [student.id])).toMatchObject({ code: 'not-found' });
    expect(await enrol(registrar.context, classId, [student.id])).toMatchObject({ ok: true, value: { enrolled: 1 } });
  });

  it('shows a registrar need and reason, and ends without deleting', async () => {
    const id = idOf(await giveAccommodation(registrar.context, student.id, accommodation));
    expect(await endAccommodation(registrar.context, id)).toMatchObject({ ok: true });
    const list = await listAccommodations(registrar.context, student.id);
    expect(list.ok && list.value[0]).toMatchObject({ need: '+25 %, rest 15 min', reason: 'Doctor' });
    expect(list.ok && list.value[0]?.endedAt).toBeInstanceOf(Date);
    expect(await giveAccommodation(registrar.context, student.id, { ...accommodation, extraPercent: 0, restMinutes: 0 })).toMatchObject({ code: 'invalid' });
  });
});

describe('a roster', () => {
  const rows = 'Name,Number,E-mail,Class,Extra time %\nNoémie Roy,kr-1,,EL2-B,\nTenzin,KR-50,,EL9-X,25\nWei Zhang,KR-51,wei@school.test,EL2-B,\n';

  it('with one problem changes nothing at all', async () => {
    const before = await database.owner.selectFrom('account').selectAll().orderBy('id').execute();
    const id = idOf(await previewRoster(registrar.context, roster(rows)));
    const preview = await readPreview(registrar.context, id);
    expect(preview.ok && preview.value.problems).toEqual([{ line: 3, column: 'Class', says: expect.stringContaining('EL9-X') }]);
    expect(await takeRoster(registrar.context, id)).toMatchObject({ code: 'problems' });
    expect(await database.owner.selectFrom('account').selectAll().orderBy('id').execute()).toEqual(before);
  });

  it('is taken in once, knows people by number, and a second time changes nothing', async () => {
    const id = idOf(await previewRoster(registrar.context, roster(rows, { makeClasses: true, invite: true })));
    const preview = await readPreview(registrar.context, id);
    expect(preview.ok && preview.value.rows.map((row) => row.changes)).toEqual([
      ['name was Noémie Bélanger'],
      ['new student', 'enrolled in EL9-X', 'accommodation +25 %'],
      ['new student', 'enrolled in EL2-B'],
    ]);
    const answers = await Promise.all([takeRoster(registrar.context, id), takeRoster(registrar.context, id)]);
    expect(answers.filter((answer) => answer.ok)).toMatchObject([{ value: { people: 3, added: 2, changed: 1, enrolled: 2, invited: 1 } }]);
    const again = idOf(await previewRoster(registrar.context, roster(rows, { makeClasses: true })));
    const seen = await readPreview(registrar.context, again);
    expect(seen.ok && seen.value.rows.flatMap((row) => row.changes)).toEqual([]);
    const kept = await database.owner.selectFrom('roster_import').where('id', '=', id).select(['state', 'rows', 'problems']).executeTakeFirstOrThrow();
    expect(kept).toEqual({ state: 'taken', rows: {}, problems: [] });
  });

  it('is planned anew when it is taken: what changed meanwhile stands against it', async () => {
    const id = idOf(await previewRoster(registrar.context, roster('Name,Number\nLate,LT-1\n')));
    const late = await newPerson(registrar, ['student'], { learnerNumber: 'LT-1' });
    await closeAccount(registrar.context, late.id);
    expect(await takeRoster(registrar.context, id)).toMatchObject({ code: 'problems' });
  });

  it('refuses a number and an e-mail that belong to two people', async () => {
    const id = idOf(await previewRoster(registrar.context, roster('Name,Number,E-mail\nWho,KR-50,wei@school.test\n')));
    const preview = await readPreview(registrar.context, id);
    expect(preview.ok && preview.value.problems).toMatchObject([{ line: 2, column: 'E-mail' }]);
  });
});
