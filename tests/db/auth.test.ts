import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { changePassword, endAllSignIns, endSignIn, redeemLink, signInWithPassword, signInWithSlip } from '@/lib/auth/commands';
import { makeLink, requestReset, sendRequestedLink } from '@/lib/auth/links';
import { wrongSignIn } from '@/lib/auth/model';
import { readActor, readLink } from '@/lib/auth/queries';
import { slowing } from '@/lib/auth/rules';
import { closeAccount, inviteAccount, reopenAccount, setRoles } from '@/lib/people/commands';
import { makeSlips } from '@/lib/slips/commands';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';
import { firstRegistrar, goodPassword, newPerson, type Person } from '@/tests/support/people';

let database: TestDatabase;
let registrar: Person;
beforeAll(async () => {
  database = await openTestDatabase();
  registrar = await firstRegistrar(database.app);
});
afterAll(() => database.close());
beforeEach(async () => {
  await database.owner.deleteFrom('sign_in_delay').execute();
});

const origin = { address: '10.0.0.7', device: 'Firefox on Windows' };
const signIn = (identifier: string, password = goodPassword, from = origin) => signInWithPassword(database.app, { identifier, password }, from);

/** Signs in and gives the sign-in's id. */
async function signedIn(identifier: string): Promise<string> {
  const result = await signIn(identifier);
  if (!result.ok) throw new Error(result.says);
  return result.value.signInId;
}

const linkFor = (id: string, purpose: 'invitation' | 'reset') =>
  database.app.transaction().execute((db) => makeLink({ ...registrar.context, db }, id, purpose));

describe('signing in', () => {
  it('takes e-mail or learner number in any case and makes a new sign-in each time', async () => {
    const person = await newPerson(registrar, ['student', 'proctor'], { email: 'mixed@school.test', learnerNumber: 'Kr-77' });
    const ids = [await signedIn('MIXED@school.test'), await signedIn('kR-77')];
    expect(new Set(ids).size).toBe(2);
    const actor = await readActor(database.app, ids[0] ?? '');
    expect(actor).toMatchObject({ id: person.id });
    expect(actor?.roles).toEqual(new Set(['student', 'proctor']));
  });

  it('says the same for a wrong password, an unknown, an invited and a closed account', async () => {
    const person = await newPerson(registrar, ['student'], { email: 'closed@school.test' });
    await closeAccount(registrar.context, person.id);
    await inviteAccount(registrar.context, { name: 'Ines', sortName: '', email: 'invited@school.test', learnerNumber: '', roles: ['student'] });
    const answers = [await signIn('rosa@school.test', 'not the password')];
    for (const identifier of ['nobody@school.test', 'closed@school.test', 'invited@school.test', '']) answers.push(await signIn(identifier));
    for (const answer of answers) expect(answer).toEqual({ ok: false, code: 'wrong', says: wrongSignIn });
  });

  it('takes as long for an unknown account as for a wrong password', async () => {
    const median = async (identifier: string) => {
      const times: number[] = [];
      for (let n = 0; n < 9; n++) {
        await database.owner.deleteFrom('sign_in_delay').execute();
        const began = performance.now();
        await signIn(identifier, 'not the password');
        times.push(performance.now() - began);
      }
      return times.sort((a, b) => a - b)[4] ?? 0;
    };
    await median('rosa@school.test');
    const [known, unknown] = [await median('rosa@school.test'), await median('nobody@school.test')];
    // Both spend one argon2id verification, which is most of the time; without it the unknown one would take a tenth.
    expect(unknown / known).toBeGreaterThan(0.5);
    expect(unknown / known).toBeLessThan(2);
  });

  it('slows one account at one address after some failures, also when tried at once, and nobody else there', async () => {
    await newPerson(registrar, ['student'], { email: 'target@school.test' });
    await newPerson(registrar, ['student'], { email: 'neighbour@school.test' });
    const tries = await Promise.all(Array.from({ length: 12 }, () => signIn('target@school.test', 'guess guess')));
    const looked = tries.filter((one) => !one.ok && one.code === 'wrong').length;
    expect(looked).toBeLessThan(12);
    for (let n = 0; n < 3; n++) await database.setClock('2 minutes').then(() => signIn('target@school.test', 'guess guess'));
    const slowed = await signIn('target@school.test');
    expect(slowed).toMatchObject({ ok: false, code: 'slowed' });
    expect((await signIn('neighbour@school.test')).ok).toBe(true);
    expect((await signIn('target@school.test', goodPassword, { ...origin, address: '10.9.9.9' })).ok).toBe(true);
    await database.setClock('2 minutes');
    expect(await signIn('target@school.test')).toMatchObject({ ok: true });
  });

  it('lets a class behind one address in although many there mistyped', async () => {
    const address = '198.51.100.4';
    const mistype = (n: number) => signIn(`unknown${n}@school.test`, 'mistyped it', { ...origin, address });
    await mistype(0);
    await database.owner.updateTable('sign_in_delay').set({ failures: slowing.address.free }).where('key', 'like', '% address:%').execute();
    for (let n = 1; n < 4; n++) expect((await mistype(n)).ok).toBe(false);
    expect(await signIn('rosa@school.test', goodPassword, { ...origin, address })).toMatchObject({ ok: true });
  });
});

describe('the end of a sign-in', () => {
  it.each([
    ['the account closes', async (person: Person) => void (await closeAccount(registrar.context, person.id))],
    ['its roles change', async (person: Person) => void (await setRoles(registrar.context, person.id, ['student', 'proctor']))],
    ['it signs out everywhere', async (person: Person) => void (await endAllSignIns(person.context))],
    ['twelve hours have passed', () => database.setClock('12 hours')],
  ])('comes at once when %s', async (_, happen) => {
    const person = await newPerson(registrar, ['student']);
    const account = await database.app.selectFrom('account').where('id', '=', person.id).select('email').executeTakeFirstOrThrow();
    const ids = [await signedIn(account.email ?? ''), await signedIn(account.email ?? '')];
    await happen(person);
    for (const id of ids) expect(await readActor(database.app, id)).toBeNull();
  });

  it('touches only the one browser when it signs out, and none comes back when a closed account reopens', async () => {
    const person = await newPerson(registrar, ['student'], { email: 'two@school.test' });
    const [first, second] = [await signedIn('two@school.test'), await signedIn('two@school.test')];
    await endSignIn(database.app, first);
    expect(await readActor(database.app, first)).toBeNull();
    expect(await readActor(database.app, second)).not.toBeNull();
    await closeAccount(registrar.context, person.id);
    await reopenAccount(registrar.context, person.id);
    expect(await readActor(database.app, second)).toBeNull();
    expect(await signedIn('two@school.test')).toBeTruthy();
  });

  it('spares the browser in which the password is changed, and no other', async () => {
    const person = await newPerson(registrar, ['student'], { email: 'change@school.test' });
    const [here, elsewhere] = [await signedIn('change@school.test'), await signedIn('change@school.test')];
    expect(await changePassword(person.context, here, { current: 'not this one', password: 'another good one' }, origin)).toMatchObject({ code: 'wrong', field: 'current' });
    expect(await changePassword(person.context, here, { current: goodPassword, password: 'another good one' }, origin)).toMatchObject({ ok: true });
    expect(await readActor(database.app, here)).not.toBeNull();
    expect(await readActor(database.app, elsewhere)).toBeNull();
    expect((await signIn('change@school.test', 'another good one')).ok).toBe(true);
    expect((await signIn('change@school.test')).ok).toBe(false);
  });
});

describe('links', () => {
  it('work once, also when redeemed twice at the same moment', async () => {
    const person = await newPerson(registrar, ['student']);
    const link = await linkFor(person.id, 'reset');
    const answers = await Promise.all([1, 2, 3, 4].map((n) => redeemLink(database.app, 'reset', { token: link.token, password: `copper wire ${n}!` })));
    expect(answers.filter((answer) => answer.ok)).toHaveLength(1);
    expect(await readLink(database.app, 'reset', link.token)).toBeNull();
  });

  it('expire, give way to a newer one, and serve their own purpose only', async () => {
    const person = await newPerson(registrar, ['student']);
    const older = await linkFor(person.id, 'reset');
    const newer = await linkFor(person.id, 'reset');
    expect(await readLink(database.app, 'reset', older.token)).toBeNull();
    expect(await readLink(database.app, 'invitation', newer.token)).toBeNull();
    expect(await readLink(database.app, 'reset', newer.token)).not.toBeNull();
    await database.setClock('2 hours');
    expect(await redeemLink(database.app, 'reset', { token: newer.token, password: goodPassword })).toMatchObject({ code: 'dead-link' });
  });

  it('leave no token in the database', async () => {
    const person = await newPerson(registrar, ['student']);
    const { token } = await linkFor(person.id, 'reset');
    const rows = await database.owner.selectFrom('account_link').where('account_id', '=', person.id).selectAll().execute();
    expect(JSON.stringify(rows)).not.toContain(token);
  });

  it('are mailed for a known account only, and asking tells no difference', async () => {
    const person = await newPerson(registrar, ['student'], { email: 'forgot@school.test' });
    const before = await mails();
    await requestReset(database.app, 'forgot@school.test', origin.address);
    await requestReset(database.app, 'nobody@school.test', origin.address);
    const { actor } = registrar.context;
    await sendRequestedLink({ db: database.app, actor }, person.id);
    await sendRequestedLink({ db: database.app, actor }, null);
    const sent = (await mails()).slice(before.length);
    expect(sent).toHaveLength(1);
    expect(sent[0]).toMatchObject({ to_address: 'forgot@school.test', kind: 'reset' });
    expect(sent[0]?.body).toContain(`${process.env.PUBLIC_URL}/reset/`);
  });
});

const mails = () => database.owner.selectFrom('mail').select(['to_address', 'kind', 'body']).orderBy('made_at').execute();

describe('slips', () => {
  it('sign in once, in any writing, and make an invited account active', async () => {
    const person = await newPerson(registrar, ['student'], { email: '', learnerNumber: 'SL-1' });
    const made = await makeSlips(registrar.context, [person.id]);
    const code = made.ok ? (made.value.slips[0]?.code ?? '') : '';
    const use = () => signInWithSlip(database.app, { learnerNumber: 'sl-1', code: code.toLowerCase().replaceAll('-', ' ') }, origin);
    const answers = await Promise.all([use(), use()]);
    expect(answers.filter((answer) => answer.ok)).toHaveLength(1);
    expect(await use()).toMatchObject({ code: 'wrong' });
  });

  it('are bound to their person, expire, and end when newer ones are made', async () => {
    const [one, other] = [await newPerson(registrar, ['student'], { learnerNumber: 'SL-2' }), await newPerson(registrar, ['student'], { learnerNumber: 'SL-3' })];
    const codeOf = async (id: string) => {
      const made = await makeSlips(registrar.context, [id]);
      return made.ok ? (made.value.slips[0]?.code ?? '') : '';
    };
    const use = (learnerNumber: string, code: string) => signInWithSlip(database.app, { learnerNumber, code }, origin);
    const older = await codeOf(one.id);
    const newer = await codeOf(one.id);
    expect((await use('SL-3', newer)).ok).toBe(false);
    expect((await use('SL-2', older)).ok).toBe(false);
    await database.setClock('25 hours');
    expect((await use('SL-2', newer)).ok).toBe(false);
    expect((await use('SL-3', await codeOf(other.id))).ok).toBe(true);
  });

  it('are made for nobody who holds more than the role of a student', async () => {
    const staff = await newPerson(registrar, ['student', 'instructor']);
    const made = await makeSlips(registrar.context, [staff.id]);
    expect(made).toMatchObject({ ok: true, value: { slips: [], left: [{ accountId: staff.id }] } });
    const student = await newPerson(registrar, ['student'], { learnerNumber: 'SL-4' });
    const slip = await makeSlips(registrar.context, [student.id]);
    await setRoles(registrar.context, student.id, ['student', 'registrar']);
    const code = slip.ok ? (slip.value.slips[0]?.code ?? '') : '';
    expect((await signInWithSlip(database.app, { learnerNumber: 'SL-4', code }, origin)).ok).toBe(false);
  });
});
