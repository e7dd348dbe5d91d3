import { type Browser, type BrowserContext, expect, type Page } from '@playwright/test';
import { addressOf, password } from '@/lib/demo/cast';

export const servers = { first: process.env.FULLFIELD_URL ?? '', second: process.env.FULLFIELD_SECOND_URL ?? '' };

/** Somebody of the demo, signed in, in a browser of their own. */
export type Visitor = { name: string; context: BrowserContext; page: Page };

/** Signs a person of the demo in by the form of the sign-in page; `server` is the process they talk to. */
export async function signIn(browser: Browser, name: string, options: { server?: string; identifier?: string } & Parameters<Browser['newContext']>[0] = {}): Promise<Visitor> {
  const { server = servers.first, identifier = addressOf(name), ...rest } = options;
  const context = await browser.newContext({ locale: 'en-CA', timezoneId: 'America/Edmonton', ...rest, baseURL: server });
  const page = await context.newPage();
  await enter(page, identifier);
  return { name, context, page };
}

/** The form of the sign-in page, filled and sent; ends on the page that a signed-in person gets first. */
export async function enter(page: Page, identifier: string): Promise<void> {
  await page.goto('/sign-in');
  await page.getByRole('textbox', { name: 'E-mail or learner number' }).fill(identifier);
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await expect(page).not.toHaveURL(/sign-in/, { timeout: 30_000 });
}

/** Presses what opens something until it is open: a button may be pressed before the page's scripts stand behind it. */
export async function press(page: Page, name: string | RegExp, opened: ReturnType<Page['getByRole']>): Promise<void> {
  await expect(async () => {
    if (!(await opened.isVisible())) await page.getByRole('button', { name, exact: typeof name === 'string' }).first().click({ timeout: 2_000 });
    await expect(opened).toBeVisible({ timeout: 2_000 });
  }).toPass({ timeout: 30_000 });
}
