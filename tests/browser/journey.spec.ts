import { type BrowserContext, expect, test } from '@playwright/test';
import { simpleParser } from 'mailparser';
import { staff } from '@/lib/demo/cast';
import { closeDatabase, database, pass, serverNow, trueTime } from './support/database';
import { csvRows, pdfText, saved } from './support/documents';
import { enter, servers, signIn, type Visitor } from './support/people';
import { answer, declareOn, goTo, part } from './support/room';
import { leaks, type Secrets, secretsOf } from './support/secrets';
import { drawsOf, inMinutes, storedAnswers } from './support/sittings';
import { allowAttachments, approveTemplate, onBoard, planSitting, writeExam, writeTemplate } from './support/staff';
import { Wire } from './support/wire';

// One term with four roles, each in a browser of their own: staff talk to one server process, candidates to the other.
test.describe.configure({ mode: 'serial' });

// Names of its own, so that it can be walked again on the same installation.
const run = Date.now().toString(36);
const template = { slug: `journey-${run}`, title: `Shunt motor of journey ${run}` };
const exam = { title: `Machines of journey ${run}`, minutes: 60, passAt: 50, templates: [template.title, 'Shunt generator, currents and generated EMF', 'Generated EMF at another speed and another flux'] };
const learner = 'Aldo Bianchi';
const vanishing = 'Chidi Eze';

let author: Visitor, reviewer: Visitor, proctor: Visitor, student: Visitor, registrar: Visitor;
let gone: BrowserContext;
let wire: Wire;
let secrets: Secrets;
let examAt = '', sittingId = '';
const ids: Record<string, string> = {};
const typed: string[] = [];
const downloads: { pdf: Buffer; csv: Buffer } = { pdf: Buffer.alloc(0), csv: Buffer.alloc(0) };

test.beforeAll(async ({ browser }) => {
  author = await signIn(browser, staff.author.name);
  reviewer = await signIn(browser, staff.reviewer.name);
  proctor = await signIn(browser, staff.proctor.name);
});
test.afterAll(async () => {
  await trueTime();
  await Promise.all([author, reviewer, proctor, student, registrar].map((visitor) => visitor?.context.close()));
  await closeDatabase();
});

/** A number as a candidate writes it: five figures and a unit. */
const written = (value: unknown, unit: string): string => {
  const text = `${Number(Number(value).toPrecision(5))} ${unit}`;
  typed.push(text);
  return text;
};

test('an instructor brings a template in, edits it, has it checked; a second one approves it', async () => {
  await writeTemplate(author.page, 'question-templates/dc-motors/shunt-back-emf.yaml', template);
  await approveTemplate(reviewer.page, template.slug);
});

test('an exam is assembled and approved, a sitting of it planned, its papers drawn', async () => {
  examAt = await writeExam(author.page, exam);
  await reviewer.page.goto(examAt);
  await reviewer.page.getByRole('button', { name: 'Approve', exact: true }).click();
  await expect(reviewer.page.getByText('Approved and frozen.')).toBeVisible();
  sittingId = await planSitting(author.page, {
    exam: examAt, class: /E3-A/, title: exam.title, room: '207', proctor: staff.proctor.name, opens: await inMinutes(-5), starts: await inMinutes(1), latest: await inMinutes(45),
  });
  const rows = await database().selectFrom('candidate').innerJoin('account', 'account.id', 'candidate.account_id').select(['candidate.id', 'account.name']).where('sitting_id', '=', sittingId).execute();
  for (const row of rows) ids[row.name] = row.id;
  secrets = await secretsOf(ids[learner] ?? '');
  expect(secrets.words.size).toBeGreaterThan(60);
  expect(secrets.figures.size).toBeGreaterThan(3);
});

test('candidates with an address are invited by e-mail with a calendar entry', async () => {
  await author.page.getByRole('button', { name: 'Invite by e-mail' }).click();
  await expect(author.page.getByText('13 invitations queued. 1 candidate without an address: a registrar or proctor prints slips for them.')).toBeVisible();
  const letters = () => database().selectFrom('sink_mail').select(['to_address', 'raw']).where('subject', '=', `Sitting: ${exam.title}`).execute();
  await expect.poll(async () => (await letters()).length, { timeout: 30_000 }).toBe(13);
  const own = (await letters()).find((letter) => letter.to_address.startsWith('aldo.bianchi@'));
  const mail = await simpleParser(own?.raw ?? '');
  expect(mail.text).toContain('Room 207, seat A1');
  expect(mail.attachments.map((file) => file.filename)).toEqual(['sitting.ics']);
  expect(String(mail.attachments[0]?.content)).toContain(`SUMMARY:${exam.title}`);
});

test('a candidate checks in, is admitted, agrees to the declaration, and is started', async ({ browser }) => {
  const context = await browser.newContext({ locale: 'en-CA', timezoneId: 'America/Edmonton', baseURL: servers.second });
  wire = new Wire(context);
  const page = await context.newPage();
  student = { name: learner, context, page };
  await wire.follow(page);
  await enter(page, 'aldo.bianchi@kettleridge.test');
  await proctor.page.goto(`/sittings/${sittingId}/board`);
  await onBoard(proctor.page, 'Open check-in');
  await expect(proctor.page.getByRole('button', { name: 'Admit all 14 expected' })).toBeVisible();
  await page.goto('/today');
  await page.getByRole('region', { name: exam.title }).getByRole('link', { name: 'Go to check-in' }).click();
  await expect(page.getByRole('heading', { name: 'Wait to be admitted' })).toBeVisible();
  await proctor.page.getByRole('button', { name: new RegExp(learner) }).click();
  await onBoard(proctor.page, 'Admit');
  await declareOn(page);
  await expect(proctor.page.getByRole('complementary', { name: `Candidate ${learner}` }).getByText('agreed', { exact: true })).toBeVisible();
  gone = (await signIn(browser, vanishing, { server: servers.second })).context;
  await proctor.page.getByRole('button', { name: new RegExp(vanishing) }).click();
  await onBoard(proctor.page, 'Admit');
  await gone.pages()[0]?.goto(`/sit/${sittingId}`);
  await declareOn(gone.pages()[0] ?? page);
  await onBoard(proctor.page, 'Start', { verb: 'Start' });
  await expect(page.getByRole('heading', { level: 1, name: 'Question 1' })).toBeVisible();
});

test('answers right, by a misstep, carried on, in a wrong unit, chosen and blank are read back and saved', async () => {
  const { page } = student;
  const [first, second, third] = await drawsOf(ids[learner] ?? '');
  if (!first || !second || !third) throw new Error('The paper has three questions.');
  const [a, b, c] = first.parts;
  await answer(page, 'a', written(a?.key.value, 'A'));
  await expect(part(page, 'a').getByText(/^reads as [\d.]+ amperes?$/)).toBeVisible();
  await answer(page, 'b', written(b?.missteps[0]?.value, 'A'));
  await answer(page, 'c', written(c?.key.value, 'V'));
  await part(page, 'd').getByRole('textbox').fill('12 A');
  await expect(part(page, 'd').getByText('cannot be read')).toBeVisible();
  await goTo(page, 2);
  const [lineCurrent, armature, emf, choice] = second.parts;
  await answer(page, 'a', written(lineCurrent?.key.value, 'A'));
  await answer(page, 'b', written(armature?.key.value, 'A'));
  await answer(page, 'c', written(Number(emf?.key.value) / 1_000, 'V'));
  await part(page, 'd').getByRole('radio', { name: choice?.options?.find((option) => option.right)?.text }).check();
  await expect(part(page, 'd').getByText('saved', { exact: true })).toBeVisible();
  await page.getByRole('button', { name: 'Flag' }).click();
  await goTo(page, 3);
  const own = written(third.parts[0]?.missteps[0]?.value, 'V');
  await answer(page, 'a', own);
  await answer(page, 'c', written((parseFloat(own) * Number(third.given.w?.value)) / 100, 'V'));
  await expect(page.getByText('all saved')).toBeVisible();
  expect(Object.fromEntries(await storedAnswers(ids[learner] ?? ''))).toMatchObject({ '3/a': own, '1/d': '12 A', '2/d': choice?.options?.find((option) => option.right)?.option });
});

test('a reload comes back to the same question with every answer and flag', async () => {
  const { page } = student;
  await page.reload();
  await expect(page.getByRole('heading', { level: 1, name: 'Question 3' })).toBeVisible();
  await expect(part(page, 'c').getByRole('textbox')).toHaveValue(typed.at(-1) ?? '');
  await expect(page.getByRole('navigation', { name: 'Questions' }).getByRole('button', { name: /^Question 2/ })).toContainText('flagged');
});

test('the board shows the progress as it is, and gives more time', async () => {
  const seat = proctor.page.getByRole('button', { name: new RegExp(learner) });
  await expect(seat).toContainText('2 of 3');
  await seat.click();
  await onBoard(proctor.page, 'More time', { verb: 'Add the time', minutes: 7, words: 'Lamp over the bench failed.' });
  await expect(proctor.page.getByRole('complementary').getByText('67 min')).toBeVisible();
  await expect(proctor.page.getByRole('complementary').getByText(/Time added, 7 min: Lamp over the bench failed/)).toBeVisible();
  const row = await database().selectFrom('candidate').select(['started_at', 'ends_at']).where('id', '=', ids[learner] ?? '').executeTakeFirstOrThrow();
  expect(((row.ends_at?.getTime() ?? 0) - (row.started_at?.getTime() ?? 0)) / 60_000).toBe(67);
});

test('pausing all covers every paper and stops the clocks; resuming gives the time back', async () => {
  const clock = () => database().selectFrom('candidate').select(['seconds_left', 'ends_at']).where('id', '=', ids[learner] ?? '').executeTakeFirstOrThrow();
  await onBoard(proctor.page, 'Pause all', { verb: 'Pause all', words: 'Fire alarm.' });
  await expect(student.page.getByRole('heading', { name: 'The clock stands' })).toBeVisible({ timeout: 2_000 });
  await expect(student.page.getByRole('textbox')).toHaveCount(0);
  const kept = Number((await clock()).seconds_left);
  await pass(30);
  await onBoard(proctor.page, 'Resume all');
  await expect(student.page.getByRole('heading', { level: 1, name: 'Question 3' })).toBeVisible();
  const left = (((await clock()).ends_at?.getTime() ?? 0) - (await serverNow()).getTime()) / 1_000;
  expect(kept - left).toBeGreaterThanOrEqual(0);
  expect(kept - left).toBeLessThan(20);
  await onBoard(proctor.page, 'Incident', { verb: 'Note it', words: 'Fire alarm, a drill; nobody left the room.' });
  expect(await database().selectFrom('incident').select(['words', 'candidate_id']).where('sitting_id', '=', sittingId).execute()).toEqual([{ words: 'Fire alarm, a drill; nobody left the room.', candidate_id: null }]);
});

test('handing in names what is blank; then the paper is closed', async () => {
  const { page } = student;
  await page.getByRole('button', { name: 'Hand in' }).click();
  const last = page.getByRole('dialog', { name: 'Hand in your paper?' });
  await expect(last.getByText('1 question has blank parts.')).toBeVisible();
  await expect(last.getByRole('button', { name: 'Question 3: part b blank' })).toBeVisible();
  await expect(last.getByText('Flagged for later: question 2.')).toBeVisible();
  await last.getByRole('button', { name: 'Hand in' }).click();
  await expect(page.getByRole('heading', { name: 'Your paper is handed in' })).toBeVisible();
  await expect(page.getByText('Everything you wrote is on the server.')).toBeVisible();
  await expect(proctor.page.getByRole('button', { name: new RegExp(learner) })).toContainText('handed in');
});

test('time ends on the server though the browser is gone', async () => {
  const page = gone.pages()[0];
  if (!page) throw new Error('The second candidate has a page.');
  const [draw] = await drawsOf(ids[vanishing] ?? '');
  await answer(page, 'a', written(draw?.parts[0]?.key.value, 'A'));
  await gone.close();
  await pass(61);
  await expect(proctor.page.getByRole('button', { name: new RegExp(vanishing) })).toContainText('timed out', { timeout: 60_000 });
  await onBoard(proctor.page, 'Close', { verb: 'Close the sitting' });
  await onBoard(proctor.page, 'Sign the register', { verb: 'Sign' });
  await expect(proctor.page.getByText('reconciled').first()).toBeVisible();
});

test('nothing that a candidate’s browser received gives a key, formula, misstep, solution, seed or name of a template away', async () => {
  await student.page.goto('/results');
  await expect(student.page.getByRole('listitem').filter({ hasText: exam.title })).toContainText('not released yet');
  const heard = await wire.all();
  expect(heard.filter(({ url }) => url === 'stream').length).toBeGreaterThan(2);
  expect(heard.some(({ url, text }) => url.endsWith('/paper') && text.includes('stemHtml'))).toBe(true);
  expect(leaks(heard, secrets, typed)).toEqual([]);
});

test('papers are marked by themselves; an instructor changes a mark with a reason, moderates and releases', async () => {
  const { page } = author;
  await page.goto('/marking');
  await page.getByRole('link', { name: exam.title }).click();
  await page.getByRole('link', { name: learner }).click();
  await expect(page.getByRole('heading', { level: 1, name: learner })).toBeVisible();
  const marks = await database().selectFrom('mark').select(['question', 'part', 'verdict', 'awarded']).where('candidate_id', '=', ids[learner] ?? '').orderBy('question').orderBy('part').execute();
  // By the templates: 1a 1; 1b a misstep, 0; 1c 2; 1d ampere for kilowatt, 0; 2a 1; 2b 2; 2c a thousand too small, 2 − 1; 2d 1; 3a a misstep, 0; 3b blank; 3c carried on from 3a, 2.
  expect(marks.map((mark) => `${mark.question}${mark.part} ${mark.verdict} ${mark.awarded}`)).toEqual([
    '1a correct 1', '1b misstep 0', '1c correct 2', expect.stringMatching(/^1d (wrong|unread) 0$/), '2a correct 1', '2b correct 2', '2c misstep 1', '2d correct 1', '3a misstep 0', '3b blank 0', '3c carried 2',
  ]);
  await page.getByRole('button', { name: 'Change the marks of question 1 part d' }).click();
  const sheet = page.getByRole('dialog', { name: 'Marks of question 1 part d' });
  await sheet.getByRole('textbox', { name: 'Marks' }).fill('2');
  await sheet.getByRole('textbox', { name: 'Reason' }).fill('Unit slipped; the figures on the working sheet are right.');
  await sheet.getByRole('button', { name: 'Change the marks' }).click();
  await expect(page.getByText(`${staff.author.name}: Unit slipped; the figures on the working sheet are right.`)).toBeVisible();
  await page.getByRole('link', { name: exam.title }).click();
  await page.getByRole('button', { name: 'Moderate' }).click();
  await page.getByRole('button', { name: 'Release results' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Release results' }).click();
  await expect(page.getByText('Every result is moderated')).toBeVisible();
  await expect(page.getByRole('button', { name: 'Release results' })).toHaveCount(0);
});

test('the student sees the marked paper with keys and the solution in the own numbers', async () => {
  const { page } = student;
  await page.goto('/results');
  await page.getByRole('link', { name: exam.title }).click();
  await expect(page.getByText('of 16 marks, 75.0 %')).toBeVisible();
  const question = page.getByRole('region', { name: 'Question 1' });
  await expect(question.getByText(/field current added to the line current/)).toBeVisible();
  await expect(question.getByRole('heading', { name: 'Solution in your numbers' })).toBeVisible();
  // The same scan finds on this page what it did not find before: it is not blind.
  expect(leaks([{ url: page.url(), text: await page.content() }], secrets, typed).length).toBeGreaterThan(5);
});

test('the registrar seals, issues the grade report, downloads it and sends it by e-mail', async ({ browser }) => {
  registrar = await signIn(browser, staff.registrar.name);
  const { page } = registrar;
  await allowAttachments(page);
  await page.goto('/records');
  await page.getByRole('link', { name: exam.title }).click();
  await page.getByRole('button', { name: 'Seal 14 results' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Seal', exact: true }).click();
  await expect(page.getByText('No mark of this sitting changes any more.')).toBeVisible();
  await page.getByRole('checkbox', { name: `Select ${learner}` }).check();
  await page.getByRole('button', { name: 'Issue grade reports' }).click();
  const link = page.getByRole('link', { name: 'PDF, issue 1' });
  await expect(link).toHaveCount(1, { timeout: 30_000 });
  [downloads.pdf, downloads.csv] = [await saved(page, () => link.click()), await saved(page, () => page.getByRole('button', { name: 'Save as CSV' }).click())];
  await page.getByRole('checkbox', { name: `Select ${learner}` }).check();
  await page.getByRole('button', { name: 'Send by e-mail' }).click();
  await page.getByRole('dialog').getByRole('button', { name: 'Send', exact: true }).click();
  await expect(async () => {
    await page.reload();
    await expect(page.getByRole('row', { name: new RegExp(learner) }).getByText('accepted')).toBeVisible({ timeout: 1_000 });
  }).toPass({ timeout: 30_000 });
});

test('the report in the mail is the one downloaded, and says what the database and the CSV say', async () => {
  const { page } = registrar;
  await page.goto('/mail');
  await page.getByRole('link', { name: `Your grade report: ${exam.title}` }).click();
  await expect(page.getByText(/75(\.0)? %/)).toHaveCount(0);
  const attached = await saved(page, () => page.getByRole('link', { name: /grade-report-issue-1\.pdf/ }).click());
  expect(attached.equals(downloads.pdf)).toBe(true);
  const text = await pdfText(attached);
  const row = csvRows(downloads.csv).find((cells) => cells[0] === learner);
  const { total, of, percent, outcome } = await database().selectFrom('result').selectAll().where('candidate_id', '=', ids[learner] ?? '').orderBy('issue', 'desc').limit(1).executeTakeFirstOrThrow();
  expect([Number(total), Number(of), Number(percent), outcome]).toEqual([12, 16, 75, 'pass']);
  expect(row?.slice(2)).toEqual(expect.arrayContaining(['12', 'pass', 'sealed', 'issue 1']));
  for (const said of [learner, 'KR-20210', exam.title, 'of 16 marks, 75.0 %, pass at 50 %', 'pass', 'page 1 of 1']) expect(text).toContain(said);
  const report = await database().selectFrom('report').select(['digest', 'code']).where('candidate_id', '=', ids[learner] ?? '').executeTakeFirstOrThrow();
  expect(text.replace(/\s/g, '')).toContain(report.digest);
  expect(text).toContain(report.code);
});
