import { expect, type Page, test } from '@playwright/test';
import { addressOf, password } from '@/lib/demo/cast';
import { closeDatabase, trueTime } from './support/database';
import { signIn } from './support/people';
import { closeByProctor, type Prepared, prepareSitting, startByProctor, storedAnswers } from './support/sittings';

const candidate = 'Adaeze Abara';
const second = 'Zara Jessop';
let room: Prepared;
test.beforeAll(trueTime);
test.afterEach(() => closeByProctor(room.sittingId));
test.afterAll(closeDatabase);

type Held = { role: string; name: string; ring: boolean; seen: boolean };

/** What has the focus: its role, its name as assistive technology hears it, whether a ring shows it and whether it is in view. */
const focused = (page: Page): Promise<Held> =>
  page.evaluate(() => {
    const held = document.activeElement;
    if (!(held instanceof HTMLElement) || held === document.body) return { role: 'none', name: '', ring: false, seen: false };
    // A choice shows the ring round its whole line.
    const ring = [held, held.closest('label')].some((one) => {
      const style = one && getComputedStyle(one);
      return style !== null && ((style.outlineStyle !== 'none' && parseFloat(style.outlineWidth) >= 2) || style.boxShadow !== 'none');
    });
    const box = held.getBoundingClientRect();
    const kinds: Record<string, string> = { A: 'link', BUTTON: 'button', TEXTAREA: 'textbox', SELECT: 'combobox', H1: 'heading' };
    const role = held.getAttribute('role') ?? (held instanceof HTMLInputElement ? ({ radio: 'radio', checkbox: 'checkbox' }[held.type] ?? 'textbox') : (kinds[held.tagName] ?? held.tagName));
    const by = held.getAttribute('aria-labelledby')?.split(' ').map((id) => document.getElementById(id)?.textContent ?? '').join(' ');
    const name = held.getAttribute('aria-label') ?? by ?? (held instanceof HTMLInputElement ? held.labels?.[0]?.textContent : held.textContent) ?? '';
    const seen = box.width > 0 && box.bottom > 0 && box.top < innerHeight && box.right > 0 && box.left < innerWidth;
    return { role, name: name.replace(/\s+/g, ' ').trim(), ring, seen };
  });

/** Presses Tab until this has the focus; on the way every stop must be visible, in view, and have a name. */
async function tabTo(page: Page, role: string, name: RegExp, back = false): Promise<void> {
  for (let presses = 0; presses < 60; presses += 1) {
    await page.keyboard.press(back ? 'Shift+Tab' : 'Tab');
    const held = await focused(page);
    if (held.role === 'none') continue;
    expect(held, `a stop is shown, in view and named: ${held.role} ${held.name}`).toMatchObject({ ring: true, seen: true, name: expect.stringMatching(/\S/) as unknown });
    if (held.role === role && name.test(held.name)) return;
  }
  throw new Error(`No ${role} ${name} was reached by Tab.`);
}

const press = (page: Page, key: string) => page.keyboard.press(key);

async function enterByKeys(page: Page): Promise<void> {
  await page.goto('/sign-in');
  await tabTo(page, 'textbox', /E-mail or learner number/);
  await page.keyboard.type(addressOf(candidate));
  await tabTo(page, 'textbox', /Password/);
  await page.keyboard.type(password);
  await press(page, 'Enter');
  await expect(page.getByRole('heading', { level: 1, name: 'Today' })).toBeVisible({ timeout: 30_000 });
  await tabTo(page, 'link', /^Go to my paper$/);
  await press(page, 'Enter');
}

async function declareByKeys(page: Page): Promise<void> {
  await expect(page.getByText('You are admitted')).toBeVisible();
  await tabTo(page, 'checkbox', /I agree/);
  await press(page, 'Space');
  await tabTo(page, 'button', /Confirm the declaration/);
  await press(page, 'Enter');
  await expect(page.getByText('You agreed to the declaration.')).toBeVisible();
}

test('a whole sitting by keyboard alone: sign in, declare, answer, choose, flag, look at formulas, hand in', async ({ page }) => {
  test.slow();
  room = await prepareSitting({ className: 'E2-A', title: 'By keyboard', admitted: [candidate] });
  await enterByKeys(page);
  await declareByKeys(page);
  await startByProctor(room.sittingId);
  await expect(page.getByRole('heading', { level: 1, name: 'Question 1' })).toBeVisible();
  await tabTo(page, 'textbox', /^Part a\./);
  await page.keyboard.type('1.5 A');
  await tabTo(page, 'textbox', /^Part b\./);
  await page.keyboard.type('20 A');
  await tabTo(page, 'button', /^Flag$/);
  await press(page, 'Space');
  await expect(page.getByRole('button', { name: 'Flag', pressed: true })).toBeVisible();
  await tabTo(page, 'button', /^Next$/);
  await press(page, 'Enter');
  await expect(page.getByRole('heading', { level: 1, name: 'Question 2' })).toBeFocused();
  await tabTo(page, 'button', /^Question 5/, true);
  await press(page, 'Enter');
  await expect(page.getByRole('heading', { level: 1, name: 'Question 5' })).toBeFocused();
  await tabTo(page, 'radio', /./);
  await press(page, 'Space');
  await press(page, 'ArrowDown');
  await expect(page.getByRole('radio', { checked: true })).toBeFocused();
  await tabTo(page, 'button', /^Formula sheet$/);
  await press(page, 'Enter');
  await expect(page.getByRole('dialog', { name: 'Formula sheet' })).toBeVisible();
  await press(page, 'Escape');
  await expect(page.getByRole('button', { name: 'Formula sheet' })).toBeFocused();
  await expect(page.getByText('all saved')).toBeVisible();
  const stored = await storedAnswers(room.candidates.get(candidate) ?? '');
  expect(stored.get('1/a')).toBe('1.5 A');
  expect([...stored].some(([place, letter]) => place.startsWith('5/') && /^[A-E]$/.test(letter))).toBe(true);
  await tabTo(page, 'button', /^Hand in$/, true);
  await press(page, 'Enter');
  await expect(page.getByRole('button', { name: 'Go on working' })).toBeFocused();
  await press(page, 'Tab');
  await press(page, 'Enter');
  await expect(page.getByRole('heading', { name: 'Your paper is handed in' })).toBeVisible();
  await tabTo(page, 'link', /Back to Today/);
});

test('the room at 320 px, and with text twice as large, needs no scrolling sideways and hides nothing', async ({ browser }) => {
  room = await prepareSitting({ className: 'E2-A', title: 'On a narrow screen', admitted: [second], running: true });
  const { page, context } = await signIn(browser, second);
  await page.goto(`/sit/${room.sittingId}`);
  const sideways = () => page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
  for (const [width, text] of [[320, '100%'], [640, '200%'], [1280, '200%']] as const) {
    await page.setViewportSize({ width, height: 900 });
    for (const question of [1, 5]) {
      await page.goto(`/sit/${room.sittingId}#question-${question}`);
      await page.reload();
      await expect(page.getByRole('heading', { level: 1, name: `Question ${question}` })).toBeVisible();
      await page.evaluate((size) => { document.documentElement.style.fontSize = size; }, text);
      expect(await sideways(), `${width} px, text ${text}, question ${question}`).toBe(0);
      await page.getByRole('button', { name: 'Hand in' }).click();
      const dialog = page.getByRole('dialog');
      await expect(dialog.getByRole('button', { name: 'Hand in' })).toBeVisible();
      expect(await sideways(), `${width} px, text ${text}, handing in`).toBe(0);
      await page.keyboard.press('Escape');
      await expect(dialog).toBeHidden();
    }
  }
  await context.close();
});
