import { expect, type Locator, type Page } from '@playwright/test';

/** The part of the open question that has this letter. */
export const part = (page: Page, letter: string): Locator => page.getByRole('region', { name: new RegExp(`^Part ${letter}\\.`) });

/** Types an answer and waits until the server has it. */
export async function answer(page: Page, letter: string, text: string): Promise<void> {
  const one = part(page, letter);
  await one.getByRole('textbox').fill(text);
  await expect(one.getByText('saved', { exact: true })).toBeVisible();
}

export const goTo = async (page: Page, question: number): Promise<void> => {
  await page.getByRole('navigation', { name: 'Questions' }).getByRole('button', { name: new RegExp(`^Question ${question}\\b`) }).click();
  await expect(page.getByRole('heading', { level: 1, name: `Question ${question}` })).toBeVisible();
};

/** Agrees to the declaration on the cover sheet. */
export async function declareOn(page: Page): Promise<void> {
  await expect(page.getByText('You are admitted')).toBeVisible();
  await page.getByRole('checkbox', { name: 'I agree' }).check();
  await page.getByRole('button', { name: 'Confirm the declaration' }).click();
  await expect(page.getByText('You agreed to the declaration.')).toBeVisible();
}

/** Waits until the service worker keeps this page and its files, so that it can be opened without network. */
export async function keptForOffline(page: Page): Promise<void> {
  await expect.poll(() => page.evaluate(async () => {
    const names = await caches.keys();
    const kept = await Promise.all(names.map(async (name) => (await (await caches.open(name)).keys()).map((request) => request.url)));
    const urls = new Set(kept.flat());
    const files = performance.getEntriesByType('resource').map((entry) => entry.name).filter((name) => name.includes('/_next/static/'));
    return navigator.serviceWorker.controller !== null || urls.has(location.origin + location.pathname) ? files.filter((name) => !urls.has(name)).length : -1;
  }), { timeout: 30_000 }).toBe(0);
}
