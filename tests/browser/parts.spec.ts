import AxeBuilder from '@axe-core/playwright';
import { expect, test, type Page } from '@playwright/test';

const rules = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'];

async function findings(axe: AxeBuilder): Promise<string[]> {
  const { violations } = await axe.analyze();
  return violations.map((one) => `${one.id}: ${one.nodes.map((node) => node.target.join(' ')).join(', ')}`);
}

const sideways = (page: Page) => page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

test('no part has a finding of axe, wide or narrow, and no page scrolls sideways', async ({ page }) => {
  test.slow();
  await page.goto('/parts');
  expect(await findings(new AxeBuilder({ page }).withTags(rules))).toEqual([]);
  for (const width of [820, 390, 320]) {
    await page.setViewportSize({ width, height: 900 });
    expect(await sideways(page), `${width}`).toBe(0);
  }
  expect(await findings(new AxeBuilder({ page }).withTags(rules)), 'at 320').toEqual([]);
});

// Only contrast differs from theme to theme.
for (const [theme, contrast] of [['dark', 'normal'], ['light', 'more'], ['dark', 'more']] as const) {
  test(`contrast suffices in ${theme}, ${contrast}`, async ({ page, context, baseURL }) => {
    const url = baseURL ?? '';
    await context.addCookies([{ name: 'theme', value: theme, url }, { name: 'contrast', value: contrast, url }]);
    await page.goto('/parts');
    expect(await page.locator('html').getAttribute('data-theme')).toBe(theme);
    expect(await findings(new AxeBuilder({ page }).withRules(['color-contrast']))).toEqual([]);
  });
}

test('colours follow the device until the switch says otherwise, and the first byte of a page knows', async ({ page, request }) => {
  const paper = () => page.evaluate(() => getComputedStyle(document.body).backgroundColor);
  await page.emulateMedia({ colorScheme: 'dark' });
  await page.goto('/parts');
  expect(await paper()).toBe('rgb(19, 23, 21)');
  await page.getByText('I. Marchetti').click();
  await page.getByRole('radio', { name: 'Light' }).check();
  expect(await paper()).toBe('rgb(246, 244, 236)');
  const cookie = (await page.context().cookies()).map((one) => `${one.name}=${one.value}`).join('; ');
  expect(await (await request.get('/parts', { headers: { cookie } })).text()).toMatch(/<html[^>]*data-theme="light"/);
});

test('Confirm: the safe answer has the focus, Escape gives it, focus returns to what asked', async ({ page }) => {
  await page.goto('/parts');
  const asker = page.getByRole('button', { name: 'Pause the room' });
  await expect(async () => {
    await asker.click();
    await expect(page.getByRole('dialog', { name: 'Pause all 21 candidates?' })).toBeVisible({ timeout: 1_000 });
  }).toPass();
  await expect(page.getByRole('button', { name: 'Keep running' })).toBeFocused();
  await page.keyboard.press('Escape');
  await expect(page.getByText('kept running', { exact: true })).toBeVisible();
  await expect(asker).toBeFocused();
  await page.keyboard.press('Enter');
  await page.keyboard.press('Tab');
  await expect(page.getByRole('button', { name: 'Pause all' })).toBeFocused();
  await page.keyboard.press('Enter');
  await expect(page.getByText('paused', { exact: true }).last()).toBeVisible();
});

test('leaving a page with something typed asks first, and staying loses nothing', async ({ page }) => {
  await page.goto('/parts');
  const title = page.getByLabel('Title', { exact: true });
  const leave = page.getByRole('dialog', { name: 'Leave without saving?' });
  await expect(async () => {
    await title.fill('');
    await title.pressSequentially('Circuits');
    await page.getByRole('link', { name: 'A link' }).evaluate((link) => link.setAttribute('href', '/sign-in'));
    await page.getByRole('link', { name: 'A link' }).click();
    await expect(leave).toBeVisible({ timeout: 1_000 });
  }).toPass();
  await page.getByRole('button', { name: 'Stay on the page' }).click();
  await expect(leave).toBeHidden();
  expect(new URL(page.url()).pathname).toBe('/parts');
  await expect(title).toHaveValue('Circuits');
});

test('a ledger saves exactly what it shows', async ({ page }) => {
  await page.goto('/parts');
  const ledger = page.getByRole('region', { name: 'Results' });
  await ledger.getByRole('searchbox').fill('kowal');
  await expect(ledger.getByText('1 of 6 candidates')).toBeVisible();
  const [download] = await Promise.all([page.waitForEvent('download'), ledger.getByRole('button', { name: 'Save as CSV' }).click()]);
  let text = '';
  for await (const chunk of await download.createReadStream()) text += String(chunk);
  expect(download.suggestedFilename()).toBe('results.csv');
  expect(text).toBe('\uFEFFCandidate,Number,Motors /40,Total,Outcome\r\n"Kowal, Ulrike",KR-20415,,,absent\r\n');
});
