import type { Role } from '@/lib/context';
import type { AccommodationInput } from '@/lib/accommodations/model';

/** What a file may hold at most. */
export const rosterLimits = { bytes: 500_000, rows: 2_000, columns: 40 } as const;

/** The columns we know, the headings they go by (compared without case, accents, spaces and signs), and what they hold. */
export const rosterColumns = [
  { key: 'name', title: 'Name', headings: ['name', 'full name', 'student', 'student name', 'apprentice', 'nom complet'], says: 'Given name first; one word is enough. Or the next two columns.' },
  { key: 'givenName', title: 'Given name', headings: ['given name', 'given names', 'first name', 'firstname', 'forename', 'prenom', 'vorname'], says: '' },
  { key: 'familyName', title: 'Family name', headings: ['family name', 'last name', 'lastname', 'surname', 'nom', 'nom de famille', 'nachname'], says: '' },
  { key: 'learnerNumber', title: 'Learner number', headings: ['learner number', 'learner no', 'learner id', 'student number', 'student no', 'student id', 'apprentice number', 'number', 'matricule', 'matrikelnummer'], says: 'Or an e-mail; people are recognised by either.' },
  { key: 'email', title: 'E-mail', headings: ['email', 'email address', 'mail', 'courriel', 'adresse courriel'], says: '' },
  { key: 'roles', title: 'Roles', headings: ['roles', 'role'], says: 'student unless said; several with + between them.' },
  { key: 'class', title: 'Class', headings: ['class', 'class name', 'section', 'group', 'groupe', 'klasse'], says: 'Students are enrolled in it, instructors teach it.' },
  { key: 'extraPercent', title: 'Extra time %', headings: ['extra time %', 'extra time percent', 'extra percent', 'extra time per cent'], says: 'Share of the time allowed.' },
  { key: 'extraMinutes', title: 'Extra minutes', headings: ['extra minutes', 'extra time minutes'], says: '' },
  { key: 'restMinutes', title: 'Rest minutes', headings: ['rest minutes', 'rest breaks', 'rest break minutes'], says: '' },
  { key: 'largePrint', title: 'Large print', headings: ['large print'], says: 'yes or no.' },
  { key: 'separateRoom', title: 'Separate room', headings: ['separate room'], says: 'yes or no.' },
  { key: 'reason', title: 'Reason', headings: ['reason', 'reason for accommodation'], says: 'Seen by registrars only.' },
  { key: 'since', title: 'From', headings: ['from', 'since', 'from date', 'starts on'], says: 'Day such as 2026-12-01; today unless said.' },
  { key: 'until', title: 'Until', headings: ['until', 'until date', 'to', 'ends on'], says: '' },
] as const;
export type ColumnKey = (typeof rosterColumns)[number]['key'];

/** One row as typed. `line` is the line of the file, the headings being line 1 in most. */
export type RawRow = { line: number; cells: Partial<Record<ColumnKey, string>> };
export type RawRoster = { encoding: 'UTF-8' | 'Windows-1252' | 'UTF-16'; separator: ',' | ';' | '\t'; columns: ColumnKey[]; unknown: string[]; rows: RawRow[] };

/** What is wrong, in which line and column. `line` 1 and no column: the whole file. */
export type RosterProblem = { line: number; column: string; says: string };

/** A row that can be read by itself. */
export type RosterRow = {
  line: number;
  name: string;
  sortName: string;
  email: string;
  learnerNumber: string;
  roles: Role[];
  class: string;
  accommodation: AccommodationInput | null;
};

/** What a row would do, for the preview. `known`: the account it is recognised as. */
export type PlannedRow = RosterRow & { known: { id: string; name: string } | null; changes: string[] };
/** What taking a roster in did: how many people it named, and of these how many were new or changed. */
export type RosterTaken = { people: number; added: number; changed: number; enrolled: number; invited: number };

export type RosterPreview = {
  id: string;
  fileName: string;
  state: 'previewed' | 'taken' | 'dropped';
  encoding: RawRoster['encoding'];
  unknown: string[];
  rows: PlannedRow[];
  problems: RosterProblem[];
  newClasses: string[];
  term: { id: string; name: string };
  makeClasses: boolean;
  invite: boolean;
  taken: RosterTaken | null;
};
