import { type BrowserContext, expect, type Page, test } from '@playwright/test';
import { addressOf, staff } from '@/lib/demo/cast';
import { closeDatabase, trueTime } from './support/database';
import { enter, servers, signIn } from './support/people';
import { answer, goTo, keptForOffline, part } from './support/room';
import { closeByProctor, type Prepared, prepareSitting, storedAnswers } from './support/sittings';
import { onBoard } from './support/staff';

const people = { offline: 'Oriel Tamsin Vance', twoDevices: 'Malin Lindqvist', wrongClock: 'Tobi Okoye' };

let room: Prepared;
test.beforeAll(async () => {
  await trueTime();
  room = await prepareSitting({ className: 'E2-B', title: 'Room under faults', admitted: Object.values(people), running: true });
});
test.afterAll(async () => {
  await closeByProctor(room.sittingId);
  await closeDatabase();
});

async function sitDown(context: BrowserContext, name: string): Promise<Page> {
  const page = await context.newPage();
  await enter(page, addressOf(name));
  await page.goto(`/sit/${room.sittingId}`);
  return page;
}
const onServer = (name: string) => storedAnswers(room.candidates.get(name) ?? '');

test('a cut network: what is written stays here, a reload works, and all of it is sent on return', async ({ context }) => {
  const page = await sitDown(context, people.offline);
  await expect(page.getByRole('heading', { level: 1, name: 'Question 1' })).toBeVisible();
  await keptForOffline(page);
  await answer(page, 'a', '1.5 A');
  await context.setOffline(true);
  await part(page, 'b').getByRole('textbox').fill('22.5 A');
  await expect(page.getByText('1 answer only here')).toBeVisible();
  await expect(page.getByText('There is no contact with the server.')).toBeVisible();
  await goTo(page, 2);
  await part(page, 'a').getByRole('textbox').fill('21.5 A');
  await expect(page.getByText('2 answers only here')).toBeVisible();
  await page.reload();
  await expect(page.getByRole('heading', { level: 1, name: 'Question 2' })).toBeVisible();
  await expect(part(page, 'a').getByRole('textbox')).toHaveValue('21.5 A');
  await goTo(page, 1);
  await expect(part(page, 'a').getByRole('textbox')).toHaveValue('1.5 A');
  await part(page, 'b').getByRole('textbox').fill('22.51 A');
  await part(page, 'c').getByRole('textbox').fill('230 V');
  await expect(page.getByText('3 answers only here')).toBeVisible();
  expect((await onServer(people.offline)).size).toBe(1);
  await context.setOffline(false);
  await expect(page.getByText('all saved')).toBeVisible({ timeout: 30_000 });
  expect(Object.fromEntries(await onServer(people.offline))).toEqual({ '1/a': '1.5 A', '1/b': '22.51 A', '1/c': '230 V', '2/a': '21.5 A' });
});

test('a second device is refused until the proctor frees the seat; the first then takes nothing more', async ({ browser, context }) => {
  const first = await sitDown(context, people.twoDevices);
  await answer(first, 'a', '2.5 A');
  const other = await browser.newContext({ baseURL: servers.second, locale: 'en-CA' });
  const second = await sitDown(other, people.twoDevices);
  await expect(second.getByRole('heading', { name: 'Your paper is on another device' })).toBeVisible();
  await expect(second.getByRole('textbox')).toHaveCount(0);
  const proctor = await signIn(browser, staff.proctor.name);
  await proctor.page.goto(`/sittings/${room.sittingId}/board`);
  await proctor.page.getByRole('button', { name: new RegExp(people.twoDevices) }).click();
  await onBoard(proctor.page, 'Other device', { verb: 'Free the seat', words: 'The tablet does not charge.' });
  await expect(first.getByRole('heading', { name: 'Your paper is on another device' })).toBeVisible();
  await expect(second.getByRole('heading', { level: 1, name: 'Question 1' })).toBeVisible({ timeout: 30_000 });
  await expect(part(second, 'a').getByRole('textbox')).toHaveValue('2.5 A');
  await answer(second, 'b', '19 A');
  expect(Object.fromEntries(await onServer(people.twoDevices))).toEqual({ '1/a': '2.5 A', '1/b': '19 A' });
  await Promise.all([other.close(), proctor.context.close()]);
});

test('a browser clock that is wrong by an hour changes neither the time left nor what is taken', async ({ context }) => {
  await context.clock.install({ time: Date.now() + 3_600_000 });
  const page = await sitDown(context, people.wrongClock);
  await answer(page, 'a', '3.5 A');
  await expect(page.getByRole('timer')).toHaveText(/^1:2\d:\d\d$|^8\d:\d\d$/);
  await expect(page.getByText('Your time is over.')).toHaveCount(0);
  expect((await onServer(people.wrongClock)).get('1/a')).toBe('3.5 A');
});
