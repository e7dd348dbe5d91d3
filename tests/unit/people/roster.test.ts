import fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import { sortNameOf } from '@/lib/people/model';
import { type RosterRow, rosterLimits } from '@/lib/rosters/model';
import { readRoster } from '@/lib/rosters/read';
import { crossProblems, readRow } from '@/lib/rosters/rules';

const utf8 = (text: string) => new TextEncoder().encode(text);
/** Windows code page 1252, which agrees with Latin 1 but for 0x80–0x9f (unicode.org, MAPPINGS/VENDORS/MICSFT/WINDOWS/CP1252.TXT). */
const cp1252 = (text: string) => Uint8Array.from([...text], (sign) => ({ '’': 0x92, 'Š': 0x8a, 'Œ': 0x8c, 'œ': 0x9c, 'Ž': 0x8e, '€': 0x80 })[sign] ?? sign.charCodeAt(0));

const day = '2026-12-01';
function read(bytes: Uint8Array): { rows: RosterRow[]; problems: string[] } {
  const raw = readRoster(bytes);
  if (!raw.ok) throw new Error(`${raw.code}: ${raw.says}`);
  const rows = raw.value.rows.map((row) => readRow(row, day));
  const problems = [...rows.flatMap((row) => row.problems), ...crossProblems(rows.map((row) => row.row))];
  return { rows: rows.map((row) => row.row), problems: problems.map((one) => `${one.line} ${one.column}`) };
}

describe('a roster file', () => {
  it.each([
    ['UTF-8 with a mark and commas', utf8('\uFEFFName,Learner number\r\nNoémie Bélanger,KR-1\r\n'), 'Noémie Bélanger'],
    ['UTF-8 with tabs', utf8('name\tlearner number\nAnneke van der Berg\tKR-1\n'), 'Anneke van der Berg'],
    ['Windows code page with semicolons', cp1252('Prénom;Nom;Matricule\r\nŠimon;D’Œuvre;KR-1\r\n'), 'Šimon D’Œuvre'],
    ['UTF-16 as some spreadsheets save it', Uint8Array.from([0xff, 0xfe, ...new Uint8Array(new Uint16Array([...'Name;Number\nŽofie;KR-1\n'].map((sign) => sign.charCodeAt(0))).buffer)]), 'Žofie'],
    ['quoted cells, family name first', utf8('Name,Student ID\n"Berg, Anneke van der",KR-1\n'), 'Anneke van der Berg'],
    ['a name of one word', utf8('Name,Learner number\nTenzin,KR-1'), 'Tenzin'],
  ])('is read: %s', (_, bytes, name) => {
    const { rows, problems } = read(bytes);
    expect(problems).toEqual([]);
    expect(rows).toMatchObject([{ name, learnerNumber: 'KR-1', roles: ['student'] }]);
  });

  it('names every bad row and column', () => {
    const text = [
      'Name,Learner number,E-mail,Roles,Extra time %,Large print,From,Until',
      'Wei Zhang,KR-1,wei@school.test,,25,,2026-12-01,2026-11-01',
      ',KR-2,,,,,,',
      'Amara,,not an address,,,,,',
      'Per,,,,,,,',
      'Ola,KR-5,,boss,,,,',
      'Ida,KR-6,,,lots,perhaps,,',
      'Eva,KR@7,,,,,,',
    ].join('\n');
    expect(read(utf8(text)).problems).toEqual(['2 Until', '3 Name', '4 E-mail', '5 Learner number', '6 Roles', '7 Extra time %', '7 Large print', '8 Learner number']);
  });

  it('reads accommodations with decimal commas and without dates', () => {
    const { rows, problems } = read(utf8('Name;Number;Extra time %;Rest breaks;Large print\nWei;KR-1;12,5 %;15;x\n'));
    expect(problems).toEqual([]);
    expect(rows[0]?.accommodation).toEqual({ extraPercent: 12.5, extraMinutes: 0, restMinutes: 15, largePrint: true, separateRoom: false, reason: '', since: day, until: '' });
  });

  it('takes one person in two classes and no other doubles', () => {
    const head = 'Name,Number,E-mail,Class\n';
    expect(read(utf8(`${head}Wei,KR-1,,A\nWei,kr-1,,B\n`)).problems).toEqual([]);
    expect(read(utf8(`${head}Wei,KR-1,,A\nWei,KR-1,,a\n`)).problems).toEqual(['3 Class']);
    expect(read(utf8(`${head}Wei,KR-1,,A\nAda,KR-1,,B\n`)).problems).toEqual(['3 Learner number']);
    expect(read(utf8(`${head}Wei,KR-1,w@school.test,A\nAda,KR-2,w@school.test,A\n`)).problems).toEqual(['3 E-mail']);
  });

  it.each([
    ['too large', new Uint8Array(rosterLimits.bytes + 1).fill(0x61), 'too-large'],
    ['a spreadsheet', utf8('PK\u0003\u0004xl/workbook.xml'), 'not-csv'],
    ['an open quotation mark', utf8('Name,Number\n"Wei,KR-1\nAda,KR-2\n'), 'not-csv'],
    ['no names', utf8('Number,Class\nKR-1,A\n'), 'no-name-column'],
    ['a column twice', utf8('Name,Number,Student ID\nWei,KR-1,KR-2\n'), 'column-twice'],
    ['headings alone', utf8('Name,Number\n'), 'empty'],
    ['too many rows', utf8(`Name,Number\n${'W,K\n'.repeat(rosterLimits.rows + 1)}`), 'too-many-rows'],
  ])('is refused: %s', (_, bytes, code) => {
    expect(readRoster(bytes)).toMatchObject({ ok: false, code });
  });

  it('never throws, whatever the bytes', () => {
    fc.assert(
      fc.property(fc.oneof(fc.uint8Array({ maxLength: 400 }), fc.string({ unit: 'binary', maxLength: 300 }).map((text) => utf8(`Name,Number,From\n${text}`))), (bytes) => {
        const raw = readRoster(bytes);
        if (raw.ok) crossProblems(raw.value.rows.map((row) => readRow(row, day).row));
        return true;
      }),
    );
  });
});

describe('the sort name', () => {
  it.each([
    ['Anneke van der Berg', 'van der Berg, Anneke'],
    ['José Luis Ortega', 'Ortega, José Luis'],
    ['Tenzin', 'Tenzin'],
    ['  Wei   Zhang ', 'Zhang, Wei'],
  ])('of %s', (name, sorted) => expect(sortNameOf(name)).toBe(sorted));
});
