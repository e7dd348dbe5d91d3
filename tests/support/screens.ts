import { mkdir } from 'node:fs/promises';
import path from 'node:path';
import { type Browser, chromium, type Page } from '@playwright/test';
import { demoAccounts } from '@/lib/demo/accounts';

/**
 * `npm run screens`: pictures of the roles' main screens from a running demo (`FULLFIELD_URL`, else port 3000), for the README
 * and for looking at. `SCREENS=all` takes every listed screen at three widths, light and dark, into the folder named last.
 */
const base = process.env.FULLFIELD_URL ?? 'http://127.0.0.1:3000';
const all = process.env.SCREENS === 'all';
const folder = process.argv[2] ?? 'tests/screens';

type Shot = { name: string; role: string; open: (page: Page) => Promise<void>; main?: boolean };
const go = (address: string) => async (page: Page) => void (await page.goto(base + address));
/** Opens a ledger and then the first thing in it that a link of this shape leads to. */
const first = (address: string, shape: RegExp, then = '') => async (page: Page) => {
  await page.goto(base + address);
  const links = await page.locator('main a[href]').evaluateAll((found) => found.map((link) => link.getAttribute('href') ?? ''));
  const href = links.find((link) => shape.test(link));
  if (!href) throw new Error(`No link like ${shape} on ${address}.`);
  await page.goto(base + href + then);
};
const id = '[0-9a-f-]{36}';

const shots: Shot[] = [
  { name: 'sign-in', role: '', open: go('/sign-in'), main: true },
  { name: 'bank', role: 'instructor', open: go('/bank'), main: true },
  { name: 'template', role: 'instructor', open: go('/bank/shunt-weakened-field'), main: true },
  { name: 'exams', role: 'instructor', open: go('/exams') },
  { name: 'exam', role: 'instructor', open: first('/exams', new RegExp(`^/exams/${id}$`)) },
  { name: 'sittings', role: 'instructor', open: go('/sittings') },
  { name: 'sitting', role: 'instructor', open: first('/sittings', new RegExp(`^/sittings/${id}$`)) },
  { name: 'marking', role: 'instructor', open: go('/marking') },
  { name: 'marking-sitting', role: 'instructor', open: first('/marking', new RegExp(`^/marking/${id}$`)) },
  { name: 'proctor-sittings', role: 'proctor', open: go('/sittings') },
  { name: 'board', role: 'proctor', open: first('/sittings', new RegExp(`^/sittings/${id}$`), '/board'), main: true },
  { name: 'people', role: 'registrar', open: go('/people'), main: true },
  { name: 'person', role: 'registrar', open: first('/people', new RegExp(`^/people/${id}$`)) },
  { name: 'classes', role: 'registrar', open: go('/people/classes') },
  { name: 'class', role: 'registrar', open: first('/people/classes', new RegExp(`^/people/classes/${id}$`)) },
  { name: 'terms', role: 'registrar', open: go('/people/terms') },
  { name: 'import', role: 'registrar', open: go('/people/import') },
  { name: 'school', role: 'registrar', open: go('/school') },
  { name: 'records', role: 'registrar', open: go('/records') },
  { name: 'class-results', role: 'registrar', open: first('/records', new RegExp(`^/records/${id}$`)), main: true },
  { name: 'today', role: 'student', open: go('/today'), main: true },
  { name: 'rehearse', role: 'student', open: go('/rehearse') },
  { name: 'rehearsal', role: 'student', open: async (page) => {
    await page.goto(`${base}/rehearse`);
    await page.getByRole('button', { name: 'Begin the rehearsal' }).click();
    await page.getByRole('textbox').first().fill('0.005 kA');
  }, main: true },
  { name: 'student-results', role: 'student', open: go('/results') },
  { name: 'account', role: 'student', open: go('/account') },
];
const sizes = all ? [390, 820, 1440] : [1440];
const themes = all ? (['light', 'dark'] as const) : (['light'] as const);

async function signedIn(browser: Browser, role: string, theme: 'light' | 'dark') {
  const context = await browser.newContext({ colorScheme: theme, deviceScaleFactor: 1 });
  if (role === '') return context;
  const account = demoAccounts.find((one) => one.role === role);
  if (!account) throw new Error(`No demo account of a ${role}.`);
  const page = await context.newPage();
  await page.goto(`${base}/sign-in`);
  await page.getByLabel('E-mail or learner number').fill(account.signIn);
  await page.getByLabel('Password', { exact: true }).fill(account.password);
  await page.getByRole('button', { name: 'Sign in', exact: true }).click();
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'));
  await page.close();
  return context;
}

async function take(browser: Browser, role: string, theme: 'light' | 'dark', wanted: readonly Shot[]): Promise<void> {
  const context = await signedIn(browser, role, theme);
  for (const shot of wanted) {
    const page = await context.newPage();
    for (const width of sizes) {
      await page.setViewportSize({ width, height: width === 390 ? 844 : 900 });
      try {
        await shot.open(page);
        await page.waitForLoadState('load');
        await page.evaluate(() => document.fonts.ready);
        const wide = await page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
        const name = all ? `${shot.name}-${width}-${theme}.png` : `${shot.name}.png`;
        await page.screenshot({ path: path.join(folder, name), fullPage: all });
        process.stdout.write(`${name}${wide > 0 ? `  scrolls sideways by ${wide}` : ''}\n`);
      } catch (error) {
        process.stdout.write(`${shot.name} ${width} ${theme}: ${error instanceof Error ? error.message.split('\n')[0] : String(error)}\n`);
        process.exitCode = 1;
      }
    }
    await page.close();
  }
  await context.close();
}

const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: ['--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'] });
await mkdir(folder, { recursive: true });
const only = process.env.ONLY?.split(',');
for (const theme of themes) {
  for (const role of [...new Set(shots.map((shot) => shot.role))]) {
    await take(browser, role, theme, shots.filter((shot) => shot.role === role && (all || shot.main) && (!only || only.includes(shot.name))));
  }
}
await browser.close();
