import { execFileSync } from 'node:child_process';
import { mkdtemp, rm, writeFile } from 'node:fs/promises';
import os from 'node:os';
import path from 'node:path';
import type { Page } from '@playwright/test';
import { parse } from 'csv-parse/sync';

/** The bytes of the file that a press downloads. */
export async function saved(page: Page, press: () => Promise<void>): Promise<Buffer> {
  const [download] = await Promise.all([page.waitForEvent('download'), press()]);
  const pieces: Buffer[] = [];
  for await (const piece of await download.createReadStream()) pieces.push(piece as Buffer);
  return Buffer.concat(pieces);
}

/** The text of a PDF as poppler reads it, spaces drawn together. */
export async function pdfText(pdf: Buffer): Promise<string> {
  const folder = await mkdtemp(path.join(os.tmpdir(), 'fullfield-pdf-'));
  try {
    await writeFile(path.join(folder, 'report.pdf'), pdf);
    return execFileSync('pdftotext', ['-layout', path.join(folder, 'report.pdf'), '-'], { encoding: 'utf8' }).replace(/\s+/g, ' ');
  } finally {
    await rm(folder, { recursive: true, force: true });
  }
}

export const csvRows = (bytes: Buffer): string[][] => parse(bytes, { bom: true });
