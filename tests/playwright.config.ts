import { fileURLToPath } from 'node:url';
import { defineConfig } from '@playwright/test';

const here = (to: string) => fileURLToPath(new URL(to, import.meta.url));
const report = process.env.PLAYWRIGHT_REPORT;

export default defineConfig({
  testDir: here('./browser'),
  outputDir: here('../test-results'),
  globalSetup: here('./support/browser.global.ts'),
  timeout: 120_000,
  expect: { timeout: 15_000 },
  // One installation serves all files, and some of them shift its clock.
  workers: 1,
  forbidOnly: process.env.CI !== undefined,
  reporter: report ? [['list'], ['json', { outputFile: report }]] : [['list']],
  use: {
    baseURL: process.env.FULLFIELD_URL,
    locale: 'en-CA',
    timezoneId: 'America/Edmonton',
    screenshot: 'only-on-failure',
    trace: 'retain-on-failure',
    launchOptions: {
      executablePath: '/usr/bin/chromium',
      args: [
        ...['--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run'],
        ...['--disable-background-networking', '--disable-component-update', '--disable-sync'],
      ],
    },
  },
});
