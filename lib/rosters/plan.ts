import { type AccommodationInput, needInWords } from '@/lib/accommodations/model';
import type { Role } from '@/lib/context';
import type { PlannedRow, RosterProblem, RosterRow } from './model';

/** What the school has already, as far as the rows concern it. */
export type KnownAccount = {
  id: string;
  name: string;
  sortName: string;
  email: string | null;
  learnerNumber: string | null;
  state: string;
  roles: readonly Role[];
  /** Ids of the classes of the term enrolled in now, and taught. */
  enrolledIn: readonly string[];
  teaches: readonly string[];
  accommodations: readonly Omit<AccommodationInput, 'reason'>[];
};
export type Surroundings = { accounts: readonly KnownAccount[]; classes: readonly { id: string; name: string }[]; term: { id: string; name: string }; makeClasses: boolean };

/** What one row does, decided: `update` fills in and changes, nothing is taken away. */
export type Step = {
  row: RosterRow;
  known: KnownAccount | null;
  update: { name?: string; sortName?: string; email?: string; learnerNumber?: string };
  addRoles: Role[];
  enrols: boolean;
  teaches: boolean;
  accommodates: boolean;
};
export type Plan = { steps: Step[]; planned: PlannedRow[]; problems: RosterProblem[]; newClasses: string[] };

const sameText = (a: string | null, b: string): boolean => (a ?? '').toLowerCase() === b.toLowerCase();

export const sameNeed = (a: Omit<AccommodationInput, 'reason'>, b: Omit<AccommodationInput, 'reason'>): boolean =>
  needInWords(a) === needInWords(b) && a.since <= b.since && (a.until === '' || (b.until !== '' && b.until <= a.until));

/** The account a row means; or why it cannot be told. */
function recognise(row: RosterRow, accounts: readonly KnownAccount[]): KnownAccount | null | RosterProblem {
  const byNumber = row.learnerNumber ? accounts.find((one) => sameText(one.learnerNumber, row.learnerNumber)) : undefined;
  const byEmail = row.email ? accounts.find((one) => one.email === row.email) : undefined;
  if (byNumber && byEmail && byNumber.id !== byEmail.id)
    return { line: row.line, column: 'E-mail', says: `The learner number is ${byNumber.name}'s, the e-mail is ${byEmail.name}'s. Correct one of them.` };
  if (!byNumber && byEmail && row.learnerNumber && byEmail.learnerNumber)
    return { line: row.line, column: 'Learner number', says: `The e-mail is ${byEmail.name}'s, whose learner number is ${byEmail.learnerNumber}. Correct one of them.` };
  const known = byNumber ?? byEmail ?? null;
  if (known?.state === 'closed') return { line: row.line, column: 'Name', says: `${known.name}'s account is closed. Reopen it first, or take the row out.` };
  return known;
}

function stepFor(row: RosterRow, known: KnownAccount | null, classId: string | undefined): Step {
  const update: Step['update'] = {};
  if (known) {
    if (known.name !== row.name) Object.assign(update, { name: row.name, sortName: row.sortName });
    if (row.email && known.email !== row.email) update.email = row.email;
    if (row.learnerNumber && !sameText(known.learnerNumber, row.learnerNumber)) update.learnerNumber = row.learnerNumber;
  }
  const student = row.roles.includes('student');
  return {
    row,
    known,
    update,
    addRoles: row.roles.filter((role) => !known?.roles.includes(role)),
    enrols: row.class !== '' && student && !(classId && known?.enrolledIn.includes(classId)),
    teaches: row.class !== '' && !student && row.roles.includes('instructor') && !(classId && known?.teaches.includes(classId)),
    accommodates: row.accommodation !== null && !known?.accommodations.some((one) => row.accommodation && sameNeed(one, row.accommodation)),
  };
}

/** What a step changes, in words. */
function changesOf({ row, known, update, addRoles, enrols, teaches, accommodates }: Step): string[] {
  return [
    !known && `new ${row.roles.join(', ')}`,
    known && update.name && `name was ${known.name}`,
    known && update.email && (known.email ? `e-mail was ${known.email}` : 'gets an e-mail'),
    known && update.learnerNumber && 'gets a learner number',
    known && addRoles.length > 0 && `becomes ${addRoles.join(', ')}`,
    enrols && `enrolled in ${row.class}`,
    teaches && `teaches ${row.class}`,
    accommodates && row.accommodation && `accommodation ${needInWords(row.accommodation)}`,
  ].filter((text) => typeof text === 'string');
}

/** What rows would do in these surroundings, and what stands against it. Changes nothing. */
export function planRoster(rows: readonly RosterRow[], around: Surroundings): Plan {
  const problems: RosterProblem[] = [];
  const newClasses = new Map<string, string>();
  const steps: Step[] = [];
  const planned = rows.map((row): PlannedRow => {
    const found = recognise(row, around.accounts);
    const problem = found && 'says' in found ? found : null;
    if (problem) problems.push(problem);
    const known = found && 'id' in found ? found : null;
    const room = around.classes.find((one) => sameText(one.name, row.class));
    if (row.class !== '' && !room) {
      if (around.makeClasses) newClasses.set(row.class.toLowerCase(), newClasses.get(row.class.toLowerCase()) ?? row.class);
      else problems.push({ line: row.line, column: 'Class', says: `${around.term.name} has no class ${row.class}. Make it first, let the import make it, or correct the name.` });
    }
    if (row.class !== '' && !row.roles.includes('student') && !row.roles.includes('instructor'))
      problems.push({ line: row.line, column: 'Class', says: 'Only students and instructors belong to a class.' });
    const step = stepFor(row, known, room?.id);
    steps.push(step);
    return { ...row, known: known && { id: known.id, name: known.name }, changes: changesOf(step) };
  });
  return { steps, planned, problems, newClasses: [...newClasses.values()] };
}
