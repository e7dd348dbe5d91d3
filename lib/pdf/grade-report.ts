import type { ReportContent } from '@/lib/reports/model';
import { colour, page } from './look';
import { type Ink, Sheet } from './sheet';

const left = page.edge;
const right = page.width - page.edge;
const columns = { marks: 412, of: 466, percent: right } as const;
const label: Ink = { face: 'cond', size: 9.75, colour: colour.soft, spacing: 0.5 };

/** The mark: two pole shoes and five field lines, from a 48-unit square. */
function mark(sheet: Sheet, x: number, y: number, size: number): void {
  sheet.ornament(() => {
    const { doc } = sheet;
    doc.save().translate(x, y).scale(size / 48);
    doc.path('M1 16h6V5h12a32 32 0 0 0 0 38H7V32H1zM47 16h-6V5H29a32 32 0 0 1 0 38h12V32h6z').fill(colour.enamel);
    doc.path('M18.5 10h11M16.25 17h15.5M15.5 24h17M16.25 31h15.5M18.5 38h11').lineWidth(2.5).stroke(colour.ink);
    doc.restore();
  });
}

/** The word of an outcome or a condition with its shape before it, ending at `right`. */
function verdict(sheet: Sheet, says: string, good: boolean | null, y: number, size: number): void {
  const tone = good === null ? colour.soft : good ? colour.enamel : colour.glyptal;
  const ink: Ink = { face: 'medium', size, colour: tone, align: 'right' };
  const shape = good === null ? 'M2.5 13.5l11-11' : good ? 'M2 8.6l4 4 8-8.8' : 'M3 3l10 10M13 3L3 13';
  sheet.line(says, right, y, ink);
  const x = right - sheet.width(says, ink) - size * 1.25;
  sheet.doc.save().translate(x, y - size * 0.75).scale(size / 18).path(shape).lineWidth(2.2).stroke(tone).restore();
}

function head(sheet: Sheet, { school }: ReportContent): void {
  mark(sheet, left, 39, 26);
  sheet.tagged('P', sheet.root, () => {
    const name = sheet.wrap(school.name, 330, { face: 'head', size: 13.5 })[0] ?? '';
    sheet.line(name, left + 35, 51, { face: 'head', size: 13.5 });
    const office = [school.office, school.address].filter(Boolean).join(', ');
    if (office) sheet.line(office, left + 35, 64, { size: 9.75, colour: colour.soft });
  });
  sheet.tagged('H1', sheet.root, () => sheet.line('Grade report', right, 57, { face: 'head', size: 16.5, align: 'right' }));
  sheet.y = 90;
}

/** The rating plate of the record: who and what, in cells. */
function plate(sheet: Sheet, content: ReportContent): void {
  const cells = [
    ['Candidate', content.candidate.name], ['Learner number', content.candidate.learnerNumber], ['Class', content.className],
    ['Exam', content.exam], ['Sat', content.sat], ['Attempt', content.attempt],
    ['Sitting', content.sitting], ['Form', content.form],
  ] as const;
  const places = [left + 26, left + 258, left + 398];
  const widths = [218, 126, 82];
  const value: Ink = { face: 'medium', size: 11.25 };
  const top = sheet.y;
  let y = top;
  for (let row = 0; row < 3; row += 1) {
    const own = cells.slice(row * 3, row * 3 + 3);
    const wrapped = own.map(([, text], at) => sheet.wrap(text, row === 2 && at === 1 ? 200 : (widths[at] ?? 80), value).slice(0, 2));
    const height = 30 + 14 * Math.max(...wrapped.map((lines) => lines.length));
    own.forEach(([name], at) => sheet.tagged('P', sheet.root, () => {
      sheet.line(name.toUpperCase(), places[at] ?? left, y + 17, label);
      (wrapped[at] ?? []).forEach((line, place) => sheet.line(line, places[at] ?? left, y + 33 + 14 * place, value));
    }));
    if (row > 0) sheet.rule(y, 0.75, colour.rule, left + 20, right - 20);
    y += height;
  }
  sheet.ornament(() => {
    const { doc } = sheet;
    doc.roundedRect(left, top, right - left, y - top, 4.5).lineWidth(1.5).stroke(colour.ink);
    for (const x of [left + 10, right - 10]) for (const at of [top + 10, y - 10]) doc.circle(x, at, 2.6).lineWidth(0.9).stroke(colour.strong);
  });
  sheet.y = y;
}

function total(sheet: Sheet, content: ReportContent): void {
  const y = sheet.y + 44;
  const absent = content.outcome === 'absent';
  sheet.tagged('P', sheet.root, () => {
    sheet.line(content.total, left, y, { face: 'figures', size: 27 });
    const after = left + sheet.width(content.total, { face: 'figures', size: 27 }) + 12;
    sheet.line(absent ? `of ${content.of} marks` : `of ${content.of} marks, ${content.percent} %, pass at ${content.passAt} %`, after, y, { colour: colour.soft });
    verdict(sheet, content.outcome, absent ? null : content.outcome === 'pass', y, 13.5);
  });
  sheet.y = y + 20;
}

type Row = { cells: readonly [string, string, string, string]; strong: boolean; head?: boolean };

function tableRow(sheet: Sheet, table: PDFKit.PDFStructureElement, { cells, strong, head: isHead }: Row, y: number): void {
  const figure: Ink = isHead ? { ...label, align: 'right' } : { face: strong ? 'figures' : 'mono', colour: strong ? colour.ink : colour.soft, align: 'right' };
  const name: Ink = isHead ? label : { face: strong ? 'bold' : 'sans', colour: strong ? colour.ink : colour.soft };
  sheet.group('TR', table, (row) => {
    cells.forEach((text, at) => sheet.tagged(at === 0 || isHead ? 'TH' : 'TD', row, () => {
      if (at === 0) sheet.line(text, strong || isHead ? left : left + 12, y, name);
      else sheet.line(text, [columns.marks, columns.of, columns.percent][at - 1] ?? right, y, figure);
    }));
  });
}

/** Marks by section and area, the total at the end. */
function breakdown(sheet: Sheet, content: ReportContent): void {
  sheet.rule(sheet.y, 1.5, colour.ink);
  sheet.group('Table', sheet.root, (table) => {
    tableRow(sheet, table, { cells: ['SECTION AND AREA', 'MARKS', 'OF', 'PERCENT'], strong: false, head: true }, sheet.y + 15);
    sheet.rule(sheet.y + 21, 0.9, colour.ink);
    sheet.y += 21;
    content.sections.forEach((section, at) => {
      sheet.need(24 + 20 * Math.min(section.areas.length, 2));
      if (at > 0) sheet.rule(sheet.y, 0.75, colour.rule);
      for (const [place, share] of [section, ...section.areas].entries()) {
        sheet.need(20);
        const title = sheet.wrap(share.title, 300, { face: 'bold' })[0] ?? '';
        tableRow(sheet, table, { cells: [title, share.awarded, share.of, share.percent], strong: place === 0 }, sheet.y + 17);
        sheet.y += place === 0 ? 24 : 20;
      }
      sheet.y += 4;
    });
    sheet.need(30);
    sheet.rule(sheet.y, 0.9, colour.ink);
    tableRow(sheet, table, { cells: ['Total', content.total, content.of, content.percent], strong: true }, sheet.y + 17);
    sheet.y += 25;
    sheet.rule(sheet.y, 0.75, colour.ink);
    sheet.rule(sheet.y + 2, 0.75, colour.ink);
  });
  sheet.y += 6;
}

function rules(sheet: Sheet, content: ReportContent): void {
  sheet.need(60 + 26 * content.rules.length);
  const count = content.rules.length;
  sheet.y += 24;
  sheet.tagged('H2', sheet.root, () =>
    sheet.line(count === 1 ? 'How the outcome is decided' : 'How the outcome is decided: all must be met', left, sheet.y, { face: 'head', size: 12 }));
  sheet.y += 10;
  sheet.rule(sheet.y, 0.75, colour.rule);
  for (const rule of content.rules) {
    sheet.tagged('P', sheet.root, () => {
      sheet.line(sheet.wrap(rule.says, 350, {})[0] ?? '', left, sheet.y + 16);
      sheet.line(rule.had, columns.of, sheet.y + 16, { face: 'mono', align: 'right' });
      verdict(sheet, rule.met ? 'met' : 'not met', rule.met, sheet.y + 16, 11.25);
    });
    sheet.y += 24;
    sheet.rule(sheet.y, 0.75, colour.rule);
  }
  sheet.y += 4;
  sheet.tagged('P', sheet.root, () => {
    for (const line of sheet.wrap(content.sentence, right - left, { size: 9.75 })) {
      sheet.y += 14;
      sheet.line(line, left, sheet.y, { size: 9.75, colour: colour.soft });
    }
  });
  sheet.y += 14;
}

const inFours = (hex: string): string[] => (hex.match(/.{1,32}/g) ?? []).map((half) => (half.match(/.{1,4}/g) ?? []).join(' '));

/** What makes the document a record: when, by whom, which issue, digests and code. Stands at the foot of the last page. */
function seal(sheet: Sheet, content: ReportContent, digest: string): void {
  const lines: [string, string[], boolean][] = [
    ['Sealed', [content.sealed], false],
    ['Issued', [content.issued.says], false],
    ['Issue', [`${content.issue}, supersedes ${content.supersedes}`], false],
    ['Digest', inFours(digest), true],
    ['Log', content.log ? [`block ${content.log.block}`, ...inFours(content.log.digest)] : ['no block yet'], true],
    ['Check code', [content.code], true],
  ];
  const height = 15 * lines.reduce((sum, [, rows]) => sum + rows.length, 0) + 18;
  sheet.need(height);
  sheet.y = Math.max(sheet.y, page.height - page.bottom - height);
  sheet.rule(sheet.y, 1.5, colour.ink);
  sheet.y += 4;
  for (const [name, rows, mono] of lines) {
    sheet.tagged('P', sheet.root, () => rows.forEach((row, at) => {
      sheet.y += 15;
      if (at === 0) sheet.line(name, left, sheet.y, { size: 9.75, colour: colour.soft });
      sheet.line(row, left + 78, sheet.y, { size: 9.75, face: mono ? 'mono' : 'sans' });
    }));
  }
}

/** A grade report as PDF: A4, tagged, always the same bytes for the same content. `digest` is that of the content [hex]. */
export async function gradeReportPdf(content: ReportContent, digest: string): Promise<Buffer> {
  const sheet = new Sheet({
    title: `Grade report, ${content.candidate.name}, ${content.exam}`, author: content.school.name, at: new Date(content.issued.at), language: 'en',
  });
  head(sheet, content);
  plate(sheet, content);
  total(sheet, content);
  if (content.sections.length > 0) breakdown(sheet, content);
  if (content.rules.length > 0) rules(sheet, content);
  seal(sheet, content, digest);
  sheet.foot([content.candidate.learnerNumber, content.exam, `issue ${content.issue}`].filter(Boolean).join(' · '));
  return sheet.bytes();
}
