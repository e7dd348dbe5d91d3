import { readFile } from 'node:fs/promises';
import { expect, type Page } from '@playwright/test';
import { press } from './people';

/** Brings a template in from a file, adds a line to its text, has it checked, asks for a review. */
export async function writeTemplate(page: Page, file: string, named: { slug: string; title: string }): Promise<void> {
  const source = (await readFile(file, 'utf8')).replace(/^template: .*$/m, `template: ${named.slug}`).replace(/^title: .*$/m, `title: ${named.title}`);
  await page.goto('/bank/files');
  await page.getByLabel('Template files').setInputFiles({ name: `${named.slug}.yaml`, mimeType: 'text/yaml', buffer: Buffer.from(source) });
  await page.getByRole('button', { name: 'Bring in' }).click();
  await page.getByRole('table', { name: 'What became of each file' }).getByRole('link', { name: `${named.slug}.yaml` }).click();
  await expect(page.getByRole('heading', { level: 1, name: named.title })).toBeVisible();
  const editor = page.getByRole('textbox', { name: 'Text of the template' });
  await expect(editor).toHaveAttribute('contenteditable', 'true');
  await editor.click();
  await page.keyboard.press('Control+End');
  await page.keyboard.type('# Figures worked through by hand on paper\n');
  await expect(page.getByText('changes not stored')).toBeVisible();
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(page.getByRole('status').filter({ hasText: /^stored/ })).toBeVisible();
  await page.getByRole('button', { name: /^Check( again)?$/ }).click();
  await expect(page.getByText('No problem in 2,000 draws.')).toBeVisible({ timeout: 90_000 });
  await page.getByRole('textbox', { name: /Note to the reviewer/ }).fill('Please look at the choice of figures.');
  await page.getByRole('button', { name: 'Ask for review' }).click();
  await expect(page.getByText(/waits for a second instructor/)).toBeVisible();
}

/** The second instructor's decision on a template. */
export async function approveTemplate(page: Page, slug: string): Promise<void> {
  await page.goto(`/bank/${slug}`);
  await expect(page.getByText('Please look at the choice of figures.')).toBeVisible();
  await page.getByRole('button', { name: 'Approve version 1' }).click();
  await expect(page.getByText('Exams can choose it.')).toBeVisible();
}

/** Writes an exam of these templates and asks for its review. Gives its address. */
export async function writeExam(page: Page, exam: { title: string; minutes: number; passAt: number; templates: readonly string[] }): Promise<string> {
  await page.goto('/exams');
  const sheet = page.getByRole('dialog', { name: 'New exam' });
  await press(page, 'New exam', sheet);
  await sheet.getByRole('textbox', { name: 'Title' }).fill(exam.title);
  await sheet.getByRole('button', { name: 'Begin the exam' }).click();
  await expect(page.getByRole('heading', { level: 1, name: exam.title })).toBeVisible();
  await page.getByRole('textbox', { name: /Title of section 1/ }).fill('Machines');
  const picker = page.getByRole('dialog', { name: 'Choose templates' });
  await press(page, 'Choose templates', picker);
  for (const title of exam.templates) await picker.getByRole('checkbox', { name: new RegExp(`^${title}`) }).check();
  await picker.getByRole('button', { name: `Take ${exam.templates.length}` }).click();
  await page.getByRole('textbox', { name: 'Time allowed' }).fill(String(exam.minutes));
  await page.getByRole('textbox', { name: 'Least share of all marks for a pass' }).fill(String(exam.passAt));
  await page.getByRole('button', { name: 'Save', exact: true }).click();
  await expect(page.getByText('Saved.')).toBeVisible();
  await page.getByRole('button', { name: 'Ask for review' }).click();
  await expect(page.getByText(/asked for a review/)).toBeVisible();
  return new URL(page.url()).pathname;
}

/** Plans a sitting of a form and waits until its papers are drawn. Gives its id. */
export async function planSitting(page: Page, sitting: { exam: string; class: RegExp; title: string; room: string; proctor: string; opens: string; starts: string; latest: string }): Promise<string> {
  await page.goto(sitting.exam);
  await page.getByRole('link', { name: 'Schedule' }).click();
  await expect(page.getByRole('heading', { level: 1, name: 'Schedule a sitting' })).toBeVisible();
  const classes = page.getByRole('combobox', { name: 'Class' });
  const wanted = await classes.getByRole('option').filter({ hasText: sitting.class }).getAttribute('value');
  await classes.selectOption(wanted ?? '');
  await page.getByRole('textbox', { name: 'Title' }).fill(sitting.title);
  await page.getByRole('textbox', { name: 'Room' }).fill(sitting.room);
  await page.getByLabel('Start', { exact: true }).fill(sitting.starts);
  await page.getByLabel('Check-in opens').fill(sitting.opens);
  await page.getByLabel('Latest start').fill(sitting.latest);
  await page.getByRole('checkbox', { name: sitting.proctor }).check();
  await page.getByRole('button', { name: 'Schedule the sitting' }).click();
  await expect(page).toHaveURL(/\/sittings\/[0-9a-f-]{36}$/);
  await expect(page.getByRole('cell', { name: 'drawn', exact: true })).toHaveCount(14, { timeout: 60_000 });
  return new URL(page.url()).pathname.split('/').at(-1) ?? '';
}

/** Presses a button of the board (the room's own, where a candidate at the side has one of that name too) and, where it asks back, fills in and confirms. */
export async function onBoard(page: Page, button: string, ask?: { verb: string; words?: string; minutes?: number }): Promise<void> {
  await page.getByRole('button', { name: button, exact: true }).first().click();
  if (!ask) return;
  const dialog = page.getByRole('dialog');
  if (ask.minutes !== undefined) await dialog.getByRole('textbox', { name: /Minutes/ }).fill(String(ask.minutes));
  if (ask.words !== undefined) await dialog.getByRole('textbox', { name: /Reason|What happened/ }).fill(ask.words);
  await dialog.getByRole('button', { name: ask.verb, exact: true }).click();
  await expect(dialog).toBeHidden();
}

/** The registrar lets grade reports be sent as PDF. */
export async function allowAttachments(page: Page): Promise<void> {
  await page.goto('/school');
  await page.getByRole('checkbox', { name: 'Grade reports may be sent as PDF' }).check();
  await page.getByRole('button', { name: 'Save the settings' }).click();
  await expect(page.getByText('The settings are saved.')).toBeVisible();
}
