import AxeBuilder from '@axe-core/playwright';
import { type Browser, expect, type Page, test } from '@playwright/test';
import { addressOf, classes, staff } from '@/lib/demo/cast';
import { closeDatabase, database, trueTime } from './support/database';
import { servers, signIn } from './support/people';
import { closeByProctor, type Prepared, prepareSitting } from './support/sittings';

const rules = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];
const over = classes[0]?.learners[0]?.name ?? '';
const sitting = classes[2]?.learners[1]?.name ?? '';

let room: Prepared;
const at: Record<string, string> = {};
test.beforeAll(async () => {
  await trueTime();
  room = await prepareSitting({ className: 'E3-A', title: 'Looked at by axe', admitted: [sitting], running: true });
  const db = database();
  const past = await db.selectFrom('sitting').select('id').where('state', '=', 'reconciled').orderBy('starts_at').executeTakeFirstOrThrow();
  const ahead = await db.selectFrom('sitting').select('id').where('state', '=', 'planned').orderBy('starts_at', 'desc').executeTakeFirstOrThrow();
  const paper = await db.selectFrom('candidate').innerJoin('account', 'account.id', 'candidate.account_id').select('candidate.id').where('sitting_id', '=', past.id).where('account.name', '=', over).executeTakeFirstOrThrow();
  const one = async (table: 'exam' | 'class') => (await db.selectFrom(table).select('id').limit(1).executeTakeFirstOrThrow()).id;
  const person = await db.selectFrom('account').select('id').where('email', '=', addressOf(over)).executeTakeFirstOrThrow();
  Object.assign(at, { past: past.id, ahead: ahead.id, running: room.sittingId, paper: paper.id, exam: await one('exam'), class: await one('class'), person: person.id });
});
test.afterAll(async () => {
  await closeByProctor(room.sittingId);
  await closeDatabase();
});

const pages: { who: string; name: string; routes: string[] }[] = [
  { who: 'a stranger', name: '', routes: ['/', '/sign-in', '/slip', '/reset', '/reset/no-such-link', '/invitation/no-such-link', '/mail', '/nowhere'] },
  { who: 'an instructor', name: staff.author.name, routes: ['/bank', '/bank/new', '/bank/files', '/bank/shunt-weakened-field', '/bank/flux-step', '/exams', '/exams/{exam}', '/exams/{exam}/paper?seed=1', '/sittings', '/sittings/new', '/sittings/{ahead}', '/sittings/{ahead}/plan', '/sittings/{past}', '/sittings/{running}/board', '/marking', '/marking/{past}', '/marking/{past}/{paper}', '/account'] },
  { who: 'a proctor', name: staff.proctor.name, routes: ['/sittings', '/sittings/{ahead}/board', '/sittings/{running}/board', '/sittings/{past}/board'] },
  { who: 'a registrar', name: staff.registrar.name, routes: ['/people', '/people/{person}', '/people/new', '/people/import', '/people/terms', '/people/classes', '/people/classes/{class}', '/sittings/{past}', '/records', '/records/{past}', '/school', '/account'] },
  { who: 'a student with results', name: over, routes: ['/today', '/results', '/results/{paper}', '/rehearse', '/account'] },
  { who: 'a candidate in the room', name: sitting, routes: ['/sit/{running}', '/sit/{running}#question-5'] },
];

const filled = (route: string): string => route.replace(/\{(\w+)\}/g, (_, name: string) => at[name] ?? '');

async function visit(browser: Browser, name: string): Promise<Page> {
  if (name) return (await signIn(browser, name, { reducedMotion: 'reduce' })).page;
  return (await browser.newContext({ baseURL: servers.first, locale: 'en-CA', reducedMotion: 'reduce' })).newPage();
}

/** Opens a page and waits until it is drawn whole: its one heading is there and nothing stands for what is still coming. */
async function open(page: Page, route: string): Promise<void> {
  await page.goto('about:blank');
  await page.goto(filled(route), { waitUntil: 'load' });
  await expect(page.getByRole('heading', { level: 1 })).toHaveCount(1);
  await expect(page.locator('[aria-busy="true"]')).toHaveCount(0);
}

async function findings(page: Page, only?: string[]): Promise<string[]> {
  // No page has frames, so axe need not open a window of its own to join what it finds in several.
  const axe = new AxeBuilder({ page }).options({ resultTypes: ['violations'] }).setLegacyMode();
  const { violations } = await (only ? axe.withRules(only) : axe.withTags(rules)).analyze();
  return violations.map((one) => `${one.id}: ${one.nodes.map((node) => node.target.join(' ')).slice(0, 3).join(', ')}`);
}

for (const { who, name, routes } of pages) {
  test(`axe finds nothing on the pages of ${who}, and their colours suffice in the dark too`, async ({ browser }) => {
    test.slow();
    const page = await visit(browser, name);
    const found: Record<string, string[]> = {};
    for (const route of routes) {
      await open(page, route);
      expect(await page.title(), `title of ${route}`).toMatch(/\S/);
      const light = await findings(page);
      await page.emulateMedia({ colorScheme: 'dark' });
      const dark = await findings(page, ['color-contrast']);
      await page.emulateMedia({ colorScheme: 'light' });
      if (light.length + dark.length > 0) found[route] = [...light, ...dark.map((one) => `dark ${one}`)];
    }
    expect(found).toEqual({});
    await page.context().close();
  });
}
