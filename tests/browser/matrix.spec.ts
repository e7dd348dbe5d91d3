import { promises as fs } from 'node:fs';
import path from 'node:path';
import { expect, test } from '@playwright/test';
import { root } from '@/lib/cli/embedded';
import { actions } from './matrix/actions';
import { addressOf, askAction, askHandler, askPage, builtActions, type Outcome } from './matrix/ask';
import { type Cast, makeCast, secret, type Things } from './matrix/cast';
import { everybody, type Gate, handlers, openHandlers, pages, peopleOf, seatHandlers, type Who } from './matrix/table';
import { seatCookieOf } from '../support/running-room';
import { closeDatabase, trueTime } from './support/database';

test.setTimeout(600_000);

let cast: Cast;
const url = process.env.FULLFIELD_URL ?? '';
test.beforeAll(async () => {
  await trueTime();
  cast = await makeCast(url, process.env.DATABASE_URL ?? '');
});
test.afterAll(async () => {
  await closeDatabase();
  await cast?.close();
});

async function files(name: string): Promise<string[]> {
  const entries = await fs.readdir(path.join(root, 'app'), { recursive: true, withFileTypes: true });
  return entries.filter((entry) => entry.isFile() && entry.name === name).map((entry) => path.join(entry.parentPath, entry.name));
}
const folderOf = (file: string): string => `/${path.relative(path.join(root, 'app'), path.dirname(file))}`;

async function handlerNames(): Promise<string[]> {
  const names = await Promise.all((await files('route.ts')).map(async (file) => {
    const text = await fs.readFile(file, 'utf8');
    const methods = ['GET', 'HEAD', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'].filter((method) => new RegExp(`export (?:async function|const) ${method}\\b|as ${method}\\b`).test(text));
    return methods.map((method) => `${method} ${folderOf(file)}`);
  }));
  return names.flat().sort();
}

test('the tables name every page, handler and action there is, and none that is not', async () => {
  expect(Object.keys(pages).sort()).toEqual((await files('page.tsx')).map(folderOf).sort());
  expect([...Object.keys(handlers), ...Object.keys(seatHandlers), ...Object.keys(openHandlers)].map((name) => name.replace(/\(\w+\)\//, '')).sort())
    .toEqual((await handlerNames()).map((name) => name.replace(/\(\w+\)\//, '')).sort());
  expect(Object.keys(actions).sort()).toEqual([...(await builtActions()).keys()].sort());
});

type Ask = (things: Things, cookie: string) => Promise<Outcome>;
type Words = { in: string; out: string; lost: string };

/** Text of a page or an answer without what differs by the address that was asked for. */
const plain = (body: string): string =>
  body.replace(/<script[\s\S]*?<\/script>/g, '').replace(/<[^>]*>/g, ' ').replace(/[0-9a-f]{8}-[0-9a-f-]{27}/g, 'id').replace(/\s+/g, ' ');

// What a request that did not read says tells nothing of the door.
const noWayIn = new Set(['signed-out', 'sign-in', 'not-found', 'not found', 'unread', 'invalid', 'unreadable']);

/** What is not as the gate says, over everybody and over what is theirs, somebody else's and nobody's. */
async function faults(name: string, gate: Gate, ask: Ask, words: Words): Promise<string[]> {
  const wrong: string[] = [];
  const kinds: [string, Things, ReadonlySet<Who>][] = [['own', cast.own, peopleOf(gate.own)]];
  if (gate.foreign !== undefined) kinds.push(['somebody else’s', cast.foreign, peopleOf(gate.foreign)], ['missing', cast.missing, new Set()]);
  for (const who of everybody) {
    const lost = new Map<string, string>();
    for (const [kind, things, allowed] of kinds) {
      const { was, body } = await ask(things, cast.cookies[who]);
      const wanted = allowed.has(who) ? words.in : who === 'nobody' ? words.out : words.lost;
      const right = wanted === 'in' ? !noWayIn.has(was) && !/^no answer|^5\d\d$/.test(was) : was === wanted;
      if (!right) wrong.push(`${name}, ${kind}, ${who}: ${was} instead of ${wanted}`);
      if (!allowed.has(who) && body.includes(secret) && !body.includes(`${secret} ${who}`)) wrong.push(`${name}, ${kind}, ${who}: the refusal tells of the thing`);
      // Whether a page says "not found" by its status or within its stream hangs on time alone; its text is not compared.
      if (wanted === words.lost && !allowed.has(who)) lost.set(words.lost === 'not found' && body.startsWith('<') ? was : plain(body), kind);
    }
    if (who !== 'nobody' && lost.size > 1) wrong.push(`${name}, ${who}: what is missing and what is forbidden look different (${[...lost.values()].join(', ')})`);
  }
  return wrong;
}

test('pages open to whom they should, and to nobody else', async () => {
  const wrong: string[] = [];
  for (const [folder, { open, with: named, ...gate }] of Object.entries(pages)) {
    const ask: Ask = (things, cookie) => askPage(url, addressOf(folder, things, named), cookie);
    if (!open) wrong.push(...(await faults(folder, gate, ask, { in: 'seen', out: 'sign-in', lost: 'not found' })));
    else expect((await ask(cast.missing, '')).body, folder).not.toContain(secret);
  }
  expect(wrong).toEqual([]);
});

test('handlers open to whom they should, and to nobody else', async () => {
  const wrong: string[] = [];
  for (const [name, { with: named, body, query, ...gate }] of Object.entries(handlers)) {
    wrong.push(...(await faults(name, gate, (things, cookie) => askHandler(url, name, things, { cookie, body, query, named }), { in: 'in', out: 'sign-in', lost: 'not found' })));
  }
  for (const [name, status] of Object.entries(openHandlers)) {
    for (const who of everybody) {
      const answered = await askHandler(url, name, cast.missing, { cookie: cast.cookies[who], ...(name.startsWith('POST') ? { body: {} } : {}) });
      if (answered.status !== status) wrong.push(`${name}, ${who}: ${answered.status} instead of ${status}`);
    }
  }
  expect(wrong).toEqual([]);
});

test('the room opens by the seat of this device in this sitting, and by nothing else', async () => {
  const key = process.env.SEAT_KEY ?? '';
  const { own, foreign } = cast.seats;
  const cookieOf = (seat: typeof own, by = key) => seatCookieOf(seat, by);
  const strangers: [string, string][] = [
    ['the seat of another sitting', cookieOf(foreign)],
    ['another candidate’s seat sealed for this sitting', cookieOf({ ...foreign, sittingId: own.sittingId })],
    ['another device', cookieOf({ ...own, device: 'another-device-0123456789' })],
    ['an epoch that is over', cookieOf({ ...own, epoch: own.epoch - 1 })],
    ['a seat sealed with another key', cookieOf(own, 'a key that is not the one of this installation')],
    ['a seat that is no token', 'seat=%7B%7D.x'],
    ...everybody.map((who): [string, string] => [who, cast.cookies[who]]),
  ];
  const wrong: string[] = [];
  for (const [name, body] of Object.entries(seatHandlers)) {
    for (const [who, cookie] of strangers) {
      const { status, body: said } = await askHandler(url, name, cast.own, { cookie, body });
      // A device that lost its seat is told so when it saves or flags; it learns nothing else.
      const told = /responses|flags/.test(name) && status === 409 && !said.includes(secret);
      const ended = name.endsWith('stream') && status === 200;
      if (status !== 404 && !told && !ended) wrong.push(`${name}, ${who}: ${status}`);
    }
    const away = await askHandler(url, name, cast.foreign, { cookie: cookieOf(own), body });
    if (away.status !== 404) wrong.push(`${name}, own seat in another sitting: ${away.status}`);
  }
  for (const [name, body] of Object.entries(seatHandlers)) {
    const { status } = await askHandler(url, name, cast.own, { cookie: cookieOf(own), body });
    if (status !== 200) wrong.push(`${name}, own seat: ${status}`);
  }
  expect(wrong).toEqual([]);
  const { count } = await cast.db.selectFrom('response').select((of) => of.fn.countAll<number>().as('count')).where('candidate_id', '=', own.candidateId).executeTakeFirstOrThrow();
  expect(count, 'of all those saves, the one by the own seat').toBe(1);
});

test('server actions do something for whom they should, and for nobody else', async () => {
  const known = await builtActions();
  const wrong: string[] = [];
  for (const [name, { send, closed, opens, ...gate }] of Object.entries(actions)) {
    const built = known.get(name);
    if (!built) continue;
    const ask: Ask = async (things, cookie) => askAction(url, built, send(things), cookie);
    wrong.push(...(await faults(name, gate, ask, { in: opens ?? 'in', out: 'signed-out', lost: 'not-found' }))
      // Whether it is shut by another word than the usual one is the table's to say.
      .filter((fault) => closed === undefined || !fault.includes(`: ${closed} instead of not-found`)));
  }
  expect(wrong).toEqual([]);
});
