import { expect, test } from '@playwright/test';

test('both servers answer, reach the database and see the worker', async ({ request }) => {
  for (const url of [process.env.FULLFIELD_URL, process.env.FULLFIELD_SECOND_URL]) {
    await expect.poll(async () => (await (await request.get(`${url}/api/health`)).json()) as object).toEqual({ ok: true, workers: 1 });
  }
});

test('a page runs under its policy without a complaint of the browser', async ({ page }) => {
  const complaints: string[] = [];
  page.on('console', (message) => message.type() === 'error' && complaints.push(message.text()));
  const response = await page.goto('/sign-in');
  expect(response?.headers()['content-security-policy']).toMatch(/script-src 'self' 'nonce-[^']{20,}' 'strict-dynamic';/);
  expect(response?.headers()['cache-control']).toContain('no-store');
  await expect(page.getByRole('heading', { level: 1 })).toBeVisible();
  expect(complaints).toEqual([]);
});

test('a change that another site asks for is refused', async ({ request }) => {
  const answer = await request.post('/api/health', { headers: { origin: 'https://elsewhere.example' }, data: {} });
  expect(answer.status()).toBe(403);
});
