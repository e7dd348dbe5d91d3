import { execFileSync } from 'node:child_process';
import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import path from 'node:path';
import { simpleParser } from 'mailparser';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { recordColumns, recordRow } from '@/components/results/records-rows';
import { ledgerCsv } from '@/components/ui/ledger/csv';
import { sealEvents } from '@/lib/audit/commands';
import { sendMail } from '@/lib/mail/send';
import { keepIn, startSink } from '@/lib/mail/sink';
import { issueReports, sendReports } from '@/lib/reports/commands';
import { type ReportContent, reportDigest } from '@/lib/reports/model';
import { readReport } from '@/lib/reports/queries';
import { moderateSitting, overrideMark, releaseResults, sealResults } from '@/lib/results/commands';
import { markSitting } from '@/lib/results/marking';
import { candidatePaper, ownPaper, ownResults } from '@/lib/results/paper-queries';
import { markingLedger, markingPage } from '@/lib/results/marking-queries';
import { recordPage, recordsLedger } from '@/lib/results/records-queries';
import { verifyRows } from '@/lib/results/verify';
import { openTestDatabase, type TestDatabase } from '../support/database';
import { valueOf } from '../support/exams';
import { closed, rightAnswers, startedSitting, write, type Writer, type Written } from '../support/results';

let database: TestDatabase;
let written: Written;
let ada: Writer;
let ben: Writer;
let absent: Writer;
let folder: string;
const ids = () => written.writers.map((writer) => writer.candidateId);

beforeAll(async () => {
  folder = mkdtempSync(path.join(tmpdir(), 'reports-'));
  database = await openTestDatabase();
  // A name that a spreadsheet would run, and one with letters that a PDF loses easily.
  written = await startedSitting(database, ['Żółć-Ωmega, Gaëlle', '=Ben, Brandt', 'Dufresne, Dov']);
  [ada, ben, absent] = written.writers as [Writer, Writer, Writer];
  await write(database, ada, await rightAnswers(written, ada));
  await write(database, ben, [(await rightAnswers(written, ben))[0]!, { a: '1 A' }]);
  await closed(written);
  await markSitting(database.app, written.sittingId);
  valueOf(await overrideMark(written.ivo, { candidateId: ben.candidateId, question: 2, part: 'a', issue: 1, awarded: 0.25, reason: 'The method is right.' }));
});
afterAll(async () => {
  rmSync(folder, { recursive: true, force: true });
  await database.close();
});

const newest = (writer: Writer) => database.owner.selectFrom('result').selectAll().where('candidate_id', '=', writer.candidateId).orderBy('issue', 'desc').limit(1).executeTakeFirstOrThrow();
const reportsOf = (writer: Writer) => database.owner.selectFrom('report').selectAll().where('candidate_id', '=', writer.candidateId).orderBy('issue').execute();
function textOf(pdf: Buffer): string {
  const file = path.join(folder, 'report.pdf');
  writeFileSync(file, pdf);
  return execFileSync('pdftotext', ['-layout', file, '-'], { encoding: 'utf8' });
}

describe('before the release', () => {
  it('shows each role its own and nobody a key: policy by role and relation', async () => {
    const { ivo, mara, piet, clerk, sittingId } = written;
    expect(valueOf(await markingLedger(ivo)).map((row) => row.id)).toEqual([sittingId]);
    expect(valueOf(await markingLedger(mara))).toEqual([]);
    for (const stranger of [mara, piet, clerk, ada.person]) {
      expect(await markingPage(stranger, sittingId)).toMatchObject({ ok: false, code: 'not-found' });
      expect(await candidatePaper(stranger, sittingId, ada.candidateId)).toMatchObject({ ok: false, code: 'not-found' });
    }
    for (const stranger of [mara, piet, ada.person]) expect(await recordPage(stranger, sittingId)).toMatchObject({ ok: false, code: 'not-found' });
    expect(valueOf(await recordsLedger(clerk)).map((row) => row.id)).toEqual([sittingId]);
    expect(await recordPage(ivo, sittingId)).toMatchObject({ ok: true, value: { keeps: false } });
    const keys = (await written.draws(ada.candidateId)).flatMap((draw) => draw.parts.map((part) => part.key.text));
    const seen = JSON.stringify([valueOf(await recordPage(clerk, sittingId)), await ownResults(ada.person)]);
    for (const key of keys.filter((text) => text.length > 3)) expect(seen).not.toContain(key);
    expect(await ownPaper(ada.person, ada.candidateId)).toMatchObject({ ok: false, code: 'not-found' });
    expect(await ownResults(ada.person)).toMatchObject([{ open: false, state: null, outcome: null, total: null }]);
    expect(await issueReports(clerk, { sittingId, candidateIds: ids() })).toMatchObject({ ok: false, code: 'nothing-to-issue' });
  });

  it('sums the parts up for the instructor', async () => {
    const page = valueOf(await markingPage(written.ivo, written.sittingId));
    expect(page.items.find((item) => item.question === 1 && item.part === 'c')).toMatchObject({ of: 3, marked: 2, meanShare: 1, verdicts: { correct: 2 } });
    expect(page.items.find((item) => item.question === 2 && item.part === 'd')).toMatchObject({ marked: 2, answered: 1, meanShare: 0.5, verdicts: { correct: 1, blank: 1 } });
    expect(page.candidates.map(({ name, result }) => [name, result?.outcome])).toEqual([['=Ben, Brandt', 'not passed'], ['Dufresne, Dov', 'absent'], ['Żółć-Ωmega, Gaëlle', 'pass']]);
  });
});

describe('after sealing', () => {
  beforeAll(async () => {
    valueOf(await moderateSitting(written.ivo, written.sittingId));
    valueOf(await releaseResults(written.ivo, written.sittingId));
    valueOf(await sealResults(written.clerk, written.sittingId));
    await sealEvents(database.app);
  });

  it('shows a student the own paper with key and solution in own numbers, and nobody else’s', async () => {
    const paper = valueOf(await ownPaper(ben.person, ben.candidateId));
    const [motor] = await written.draws(ben.candidateId);
    expect(paper.questions[0]!.marks.map((mark) => mark.key.text)).toEqual(motor!.parts.map((part) => part.key.text));
    expect(paper.questions[0]!.solutionHtml).toContain('katex');
    for (const part of motor!.parts) expect(paper.questions[0]!.solutionHtml.replace(/[^\d.]/g, '')).toContain(part.key.text.replace(/[^\d.]/g, ''));
    expect(await ownPaper(ben.person, ada.candidateId)).toMatchObject({ ok: false, code: 'not-found' });
    expect(valueOf(await ownPaper(absent.person, absent.candidateId))).toMatchObject({ result: { outcome: 'absent' }, questions: [] });
  });

  it('issues reports once, each figure of the PDF that of the database, and again as a further issue', async () => {
    const { clerk, ivo, sittingId } = written;
    expect(await issueReports(ivo, { sittingId, candidateIds: ids() })).toMatchObject({ ok: false, code: 'not-found' });
    expect(valueOf(await issueReports(clerk, { sittingId, candidateIds: ids() }))).toEqual({ issued: 3 });
    expect(await issueReports(clerk, { sittingId, candidateIds: ids() })).toMatchObject({ ok: false, code: 'nothing-to-issue' });
    const [first] = await reportsOf(ben);
    const content = first!.content as unknown as ReportContent;
    expect(first!.digest).toBe(reportDigest(content));
    const text = textOf(first!.pdf);
    const result = await newest(ben);
    // 6 of 6 and 0.25 of 6 marks; 6.25 of 12 is 52.08… %, rounded to 52.1.
    expect([result.total, result.percent]).toEqual([6.25, 52.1]);
    expect(text).toMatch(/6\.25\s+of 12 marks, 52\.1 %, pass at 70 %\s+not passed/);
    expect(text).toMatch(/Motors\s+6\.0\s+6\s+100\.0/);
    expect(text).toMatch(/Generators\s+0\.25\s+6\s+4\.2/);
    expect(text).toMatch(/Total\s+6\.25\s+12\s+52\.1/);
    expect(text).toMatch(/All marks: 70 % or more\s+52\.1 %\s+not met/);
    expect(text).toMatch(/Motors: 50 % or more\s+100\.0 %\s+met/);
    for (const word of ['=Ben, Brandt', 'Kettle Ridge Trades College', content.code, 'Mountain Standard Time, by Rea Registrar, registrar', '1, supersedes none', 'page 1 of 1']) expect(text).toContain(word);
    const compact = text.replaceAll(/\s/g, '');
    expect(compact).toContain(first!.digest);
    const head = await database.owner.selectFrom('event_block').select('digest').orderBy('number', 'desc').limit(1).executeTakeFirstOrThrow();
    expect(compact).toContain(head.digest.toString('hex'));
    expect(textOf((await reportsOf(ada))[0]!.pdf)).toContain('Żółć-Ωmega, Gaëlle');
    expect(textOf((await reportsOf(absent))[0]!.pdf)).toMatch(/–\s+of 12 marks\s+absent/);
    valueOf(await issueReports(clerk, { sittingId, candidateIds: [ben.candidateId], again: true }));
    expect(textOf((await reportsOf(ben))[1]!.pdf)).toMatch(/2, supersedes issue 1 of 8 December 2026, \d\d:\d\d Mountain Standard Time/);
    expect(await verifyRows(database.app)).toEqual([]);
  });

  it('saves as CSV what the database has: text cannot run, numbers are numbers', async () => {
    const page = valueOf(await recordPage(written.clerk, written.sittingId));
    const csv = ledgerCsv(recordColumns(page, 2).filter((column) => !column.hidden), page.lines.map((line) => recordRow(line, page.sections.length, null)));
    const rows = csv.replace('\uFEFF', '').trim().split('\r\n');
    expect(rows[0]).toBe('Candidate,Number,Motors /6,Generators /6,Total,Outcome,Result,Report,E-mail');
    expect(rows).toContain(`"'=Ben, Brandt",,6,0.25,6.25,not passed,sealed,issue 2,not sent`);
    expect(rows).toContain('"Dufresne, Dov",,,,,absent,sealed,issue 1,not sent');
  });

  it('gives a report’s file to registrar, own instructor and own student only', async () => {
    const id = (await reportsOf(ben))[1]!.id;
    for (const reader of [written.clerk, written.ivo, ben.person]) expect(valueOf(await readReport(reader, id)).pdf.subarray(0, 5).toString()).toBe('%PDF-');
    for (const stranger of [written.mara, written.piet, ada.person]) expect(await readReport(stranger, id)).toMatchObject({ ok: false, code: 'not-found' });
  });

  it('mails a report once an issue, with no mark in subject or text, attached where the school has it so', async () => {
    const { clerk, ivo, sittingId } = written;
    expect(await sendReports(ivo, { sittingId, candidateIds: ids() })).toMatchObject({ ok: false, code: 'not-found' });
    expect(valueOf(await sendReports(clerk, { sittingId, candidateIds: [ada.candidateId] }))).toMatchObject({ queued: 1 });
    const before = await database.owner.selectFrom('school').select('settings').executeTakeFirstOrThrow();
    await database.owner.updateTable('school').set({ settings: JSON.stringify({ ...(before.settings as object), attachReports: true }) }).execute();
    expect(valueOf(await sendReports(clerk, { sittingId, candidateIds: [ada.candidateId, ben.candidateId] }))).toEqual({ queued: 1, before: 1, withoutAddress: 0, withoutReport: 0 });
    const sink = await startSink({ port: 0, keep: keepIn(database.app) });
    for (const { id } of await database.owner.selectFrom('mail').select('id').execute()) await sendMail(database.app, sink.url, id);
    await sink.close();
    const letters = await Promise.all((await database.owner.selectFrom('sink_mail').select('raw').orderBy('id').execute()).map((row) => simpleParser(row.raw)));
    expect(letters).toHaveLength(2);
    for (const letter of letters) expect(`${letter.subject} ${letter.text}`.replaceAll(/[0-9a-f-]{36}/g, '')).not.toMatch(/\d|pass|absent/);
    expect(letters.map((letter) => letter.attachments.length).sort()).toEqual([0, 1]);
    const attached = letters.flatMap((letter) => letter.attachments)[0]!;
    expect(attached.content.equals((await reportsOf(ben))[1]!.pdf)).toBe(true);
    const page = valueOf(await recordPage(clerk, sittingId));
    expect(page.lines.map((line) => [line.name, line.report?.mail?.state ?? null])).toEqual([['=Ben, Brandt', 'accepted'], ['Dufresne, Dov', null], ['Żółć-Ωmega, Gaëlle', 'accepted']]);
  });
});
