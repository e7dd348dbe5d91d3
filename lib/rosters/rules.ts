import { accommodationSchema, type AccommodationInput } from '@/lib/accommodations/model';
import { type Role, roles as allRoles } from '@/lib/context';
import { emailField, learnerNumberField, nameField, sortNameOf, tidy } from '@/lib/people/model';
import type { ColumnKey, RawRow, RosterProblem, RosterRow } from './model';
import { titleOf } from './read';

const yes = new Set(['yes', 'y', 'x', '1', 'true', 'oui', 'ja']);
const no = new Set(['', 'no', 'n', '0', 'false', 'non', 'nein', '-']);
const needColumns: readonly ColumnKey[] = ['extraPercent', 'extraMinutes', 'restMinutes', 'largePrint', 'separateRoom'];

type Say = (key: ColumnKey, says: string) => void;

/** "25", "12,5" or "" as a number; undefined when it is none. */
function numberIn(text: string): number | undefined {
  const plain = text.replace(/\s*%$/, '').replace(',', '.').trim();
  if (plain === '') return 0;
  return /^\d{1,4}(\.\d{1,2})?$/.test(plain) ? Number(plain) : undefined;
}

function yesOrNo(text: string): boolean | undefined {
  const word = text.trim().toLowerCase();
  return yes.has(word) ? true : no.has(word) ? false : undefined;
}

function readName(cells: RawRow['cells'], say: Say): { name: string; sortName: string } {
  const given = tidy(cells.givenName ?? '');
  const family = tidy(cells.familyName ?? '');
  const whole = tidy(cells.name ?? '');
  // "Berg, Anneke van der": a spreadsheet's way to write one name.
  const turned = /^([^,]+),\s*([^,]+)$/.exec(whole);
  const name = given || family ? tidy(`${given} ${family}`) : turned ? `${turned[2]} ${turned[1]}` : whole;
  const read = nameField.safeParse(name);
  if (!read.success) say(cells.name === undefined ? 'givenName' : 'name', read.error.issues[0]?.message ?? '');
  const sortName = given && family ? `${family}, ${given}` : turned ? whole : sortNameOf(name);
  return { name, sortName };
}

function readRoles(text: string, say: Say): Role[] {
  const words = text.toLowerCase().split(/[+/&]| and /).map((word) => word.trim()).filter(Boolean);
  if (words.length === 0) return ['student'];
  const found: Role[] = [];
  for (const word of words) {
    const role = allRoles.find((one) => one === word || `${one}s` === word);
    if (role) found.push(role);
    else say('roles', `“${word}” is no role: use ${allRoles.join(', ')}.`);
  }
  return [...new Set(found)];
}

function readAccommodation(cells: RawRow['cells'], today: string, say: Say): AccommodationInput | null {
  const amount = (key: 'extraPercent' | 'extraMinutes' | 'restMinutes') => {
    const value = numberIn(cells[key] ?? '');
    if (value === undefined) say(key, `“${cells[key]}” is no number.`);
    return value ?? 0;
  };
  const flag = (key: 'largePrint' | 'separateRoom') => {
    const value = yesOrNo(cells[key] ?? '');
    if (value === undefined) say(key, `“${cells[key]}” is neither yes nor no.`);
    return value ?? false;
  };
  const needs = { extraPercent: amount('extraPercent'), extraMinutes: amount('extraMinutes'), restMinutes: amount('restMinutes'), largePrint: flag('largePrint'), separateRoom: flag('separateRoom') };
  if (!Object.values(needs).some(Boolean)) {
    const stray = (['reason', 'since', 'until'] as const).find((key) => (cells[key] ?? '') !== '' && needColumns.every((need) => !cells[need]));
    if (stray) say(stray, 'This belongs to an accommodation, but none is given in the row.');
    return null;
  }
  const read = accommodationSchema.safeParse({ ...needs, reason: cells.reason ?? '', since: cells.since || today, until: cells.until ?? '' });
  if (read.success) return read.data;
  for (const issue of read.error.issues) {
    const key = issue.path[0] as ColumnKey;
    say(key, key === 'since' || key === 'until' ? `“${cells[key] ?? ''}”: ${issue.message} Write days as 2026-12-01.` : issue.message);
  }
  return null;
}

/** One raw row as a person, with every column that is wrong named. */
export function readRow(raw: RawRow, today: string): { row: RosterRow; problems: RosterProblem[] } {
  const problems: RosterProblem[] = [];
  const say: Say = (key, says) => problems.push({ line: raw.line, column: titleOf(key), says });
  const { cells } = raw;
  const email = (cells.email ?? '').trim().toLowerCase();
  const learnerNumber = tidy(cells.learnerNumber ?? '');
  const emailRead = emailField.safeParse(email);
  if (!emailRead.success) say('email', emailRead.error.issues.flatMap((issue) => issue.message)[0] === 'Invalid input' ? `“${email}” is no e-mail address.` : (emailRead.error.issues[0]?.message ?? ''));
  const numberRead = learnerNumberField.safeParse(learnerNumber);
  if (!numberRead.success) say('learnerNumber', `“${learnerNumber}” is no learner number: letters, figures, hyphen, stop or stroke, at most 40.`);
  if (email === '' && learnerNumber === '') say('learnerNumber', 'Give a learner number or an e-mail: one of them is needed to sign in.');
  const className = tidy(cells.class ?? '');
  if (className.length > 40) say('class', 'Use at most 40 characters for a class.');
  const row = { line: raw.line, ...readName(cells, say), email, learnerNumber, roles: readRoles(cells.roles ?? '', say), class: className, accommodation: readAccommodation(cells, today, say) };
  return { row, problems };
}

/** What rows say against each other: the same person twice with another name or the same class, one identifier for two people. */
export function crossProblems(rows: readonly RosterRow[]): RosterProblem[] {
  const problems: RosterProblem[] = [];
  const seen = { learnerNumber: new Map<string, RosterRow>(), email: new Map<string, RosterRow>() };
  for (const row of rows) {
    for (const key of ['learnerNumber', 'email'] as const) {
      const value = row[key].toLowerCase();
      if (value === '') continue;
      const before = seen[key].get(value);
      if (!before) {
        seen[key].set(value, row);
        continue;
      }
      const same = before.name === row.name && before.email === row.email && before.learnerNumber.toLowerCase() === row.learnerNumber.toLowerCase();
      if (!same) problems.push({ line: row.line, column: titleOf(key), says: `${row[key]} stands in line ${before.line} too, for ${before.name}.` });
      else if (before.class.toLowerCase() === row.class.toLowerCase()) problems.push({ line: row.line, column: titleOf('class'), says: `${row.name} is in line ${before.line} already, with the same class.` });
      else continue;
      break;
    }
  }
  return problems;
}
