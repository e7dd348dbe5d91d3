import { promises as fs } from 'node:fs';
import { z } from 'zod';

export type Counts = { passed: number; failed: number };

const vitestReport = z.object({
  numPassedTests: z.number(),
  numFailedTests: z.number(),
  testResults: z.array(z.object({ status: z.string(), assertionResults: z.array(z.unknown()) })),
});
const playwrightReport = z.object({
  stats: z.object({ expected: z.number(), unexpected: z.number(), flaky: z.number() }),
  errors: z.array(z.unknown()).default([]),
});

async function read<Schema extends z.ZodType>(file: string, schema: Schema): Promise<z.infer<Schema> | undefined> {
  const text = await fs.readFile(file, 'utf8').catch(() => undefined);
  return text === undefined ? undefined : schema.parse(JSON.parse(text));
}

/** Counts of vitest's JSON report. A file that could not be loaded counts as one failure, and so does a missing report. */
export async function readVitest(file: string): Promise<Counts> {
  const report = await read(file, vitestReport);
  if (!report) return { passed: 0, failed: 1 };
  const unloaded = report.testResults.filter((result) => result.status === 'failed' && result.assertionResults.length === 0).length;
  return { passed: report.numPassedTests, failed: report.numFailedTests + unloaded };
}

/** Counts of Playwright's JSON report. A test that passed at a second try only, and an error outside of tests, count as failures. */
export async function readPlaywright(file: string): Promise<Counts> {
  const report = await read(file, playwrightReport);
  if (!report) return { passed: 0, failed: 1 };
  return { passed: report.stats.expected, failed: report.stats.unexpected + report.stats.flaky + report.errors.length };
}
