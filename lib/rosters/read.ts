import { CsvError, parse } from 'csv-parse/sync';
import { done, refuse, type Result } from '@/lib/result';
import { type ColumnKey, type RawRoster, type RawRow, rosterColumns, rosterLimits } from './model';

type Text = { text: string; encoding: RawRoster['encoding'] };

// 0x80–0x9f of Windows-1252 (unicode.org, MAPPINGS/VENDORS/MICSFT/WINDOWS/CP1252.TXT); the rest is Latin 1. Node's own decoder of that
// name leaves these as control characters (v20).
const windows = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ';

const decodeWindows = (bytes: Uint8Array): string =>
  new TextDecoder('latin1').decode(bytes).replace(/[\x80-\x9f]/g, (sign) => windows[sign.charCodeAt(0) - 0x80] ?? sign);

/** UTF-8 with or without mark, UTF-16 with a mark, and what is no UTF-8 is Windows-1252, which office programs still write. */
export function decodeText(bytes: Uint8Array): Text {
  if ((bytes[0] === 0xff && bytes[1] === 0xfe) || (bytes[0] === 0xfe && bytes[1] === 0xff))
    return { text: new TextDecoder(bytes[0] === 0xff ? 'utf-16le' : 'utf-16be').decode(bytes), encoding: 'UTF-16' };
  try {
    return { text: new TextDecoder('utf-8', { fatal: true }).decode(bytes), encoding: 'UTF-8' };
  } catch {
    return { text: decodeWindows(bytes), encoding: 'Windows-1252' };
  }
}

/** The separator that splits the first line most; a comma where none does. */
function separatorOf(text: string): RawRoster['separator'] {
  const head = (text.split(/\r\n|\r|\n/).find((line) => line.trim() !== '') ?? '').replace(/"[^"]*"/g, '');
  const count = (sign: string) => head.split(sign).length;
  const separators = [';', '\t', ','] as const;
  return separators.reduce((best, sign) => (count(sign) > count(best) ? sign : best), ',');
}

const plain = (heading: string): string =>
  heading
    .normalize('NFD')
    .replace(/\p{M}/gu, '')
    .toLowerCase()
    .replace(/[^a-z0-9%]/g, '');

const byHeading = new Map<string, ColumnKey>(rosterColumns.flatMap((column) => column.headings.map((heading): [string, ColumnKey] => [plain(heading), column.key])));

type Line = { cells: string[]; line: number };

function readRecords(text: string, delimiter: string): Result<Line[], 'not-csv' | 'too-many-rows'> {
  try {
    const records: Line[] = [];
    parse(text, {
      delimiter,
      bom: true,
      relax_column_count: true,
      skip_empty_lines: true,
      trim: true,
      max_record_size: 20_000,
      to: rosterLimits.rows + 2,
      on_record: (cells: string[], { lines }) => {
        records.push({ cells, line: lines });
        return null;
      },
    });
    if (records.length > rosterLimits.rows + 1) return refuse('too-many-rows', `The file has more than ${rosterLimits.rows.toLocaleString('en')} rows. Split it.`);
    return done(records);
  } catch (error) {
    if (!(error instanceof CsvError)) throw error;
    const line = typeof error.lines === 'number' ? ` (line ${error.lines})` : '';
    return refuse('not-csv', `The file cannot be read as CSV${line}: a quotation mark is probably not closed. Save it from the spreadsheet again.`);
  }
}

/**
 * Bytes of a CSV file → its rows under the columns we know. Separators comma, semicolon or tab, found by the first line.
 * Refuses files that are too large, are no text, or have none of our columns.
 */
export function readRoster(bytes: Uint8Array): Result<RawRoster> {
  if (bytes.length > rosterLimits.bytes) return refuse('too-large', `The file is larger than ${rosterLimits.bytes / 1000} kB. Split it, or leave out columns.`);
  if (bytes[0] === 0x50 && bytes[1] === 0x4b) return refuse('not-csv', 'This is a spreadsheet or zip file. Save it as CSV first.');
  const { text, encoding } = decodeText(bytes);
  if (text.includes('\0')) return refuse('not-csv', 'This file is no text. Save it as CSV first.');
  const separator = separatorOf(text.replace(/^\uFEFF/, ''));
  const records = readRecords(text, separator);
  if (!records.ok) return records;
  const [head, ...body] = records.value;
  if (!head) return refuse('empty', 'The file is empty.');
  if (head.cells.length > rosterLimits.columns) return refuse('too-many-columns', `The file has more than ${rosterLimits.columns} columns.`);
  const keys = head.cells.map((heading) => byHeading.get(plain(heading)));
  const columns = keys.filter((key) => key !== undefined);
  const twice = columns.find((key, place) => columns.indexOf(key) !== place);
  if (twice) return refuse('column-twice', `The column ${titleOf(twice)} is there twice. Take one out.`);
  if (!columns.includes('name') && !columns.includes('givenName') && !columns.includes('familyName'))
    return refuse('no-name-column', 'The first line has no column of names. Head it with Name, or with Given name and Family name.');
  if (body.length === 0) return refuse('empty', 'The file has a line of headings and no people below it.');
  return done({
    encoding,
    separator,
    columns,
    unknown: head.cells.filter((heading, place) => keys[place] === undefined && heading !== ''),
    rows: body.map((one): RawRow => ({ line: one.line, cells: Object.fromEntries(keys.flatMap((key, place) => (key ? [[key, one.cells[place] ?? '']] : []))) })),
  });
}

export const titleOf = (key: ColumnKey): string => rosterColumns.find((column) => column.key === key)?.title ?? key;
