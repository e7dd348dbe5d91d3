import { emptyExam } from '@/lib/exams/model';
import { schoolForm, schoolSettings } from '@/lib/school/model';
import { type Things, secret } from './cast';
import type { Gate } from './table';

/**
 * A server action: who gets in, and what it is sent about a thing. What is sent would be refused by the command itself or changes nothing that
 * another line needs, so that getting in shows as another answer than `not-found`. `closed`: how the door is shut, where it is not by `not-found`;
 * `opens`: the one answer that shows getting in.
 */
export type Action = Gate & { send(things: Things): unknown[] | FormData; closed?: string; opens?: string };

/** Fields of an input form as the one argument after `before`, in the way React sends them. */
const form = (fields: Record<string, string | Blob>, before: unknown[] = []): FormData => {
  const data = new FormData();
  for (const [name, value] of Object.entries(fields)) data.set(`_1_${name}`, value);
  data.set('0', JSON.stringify([...before, '$K1']));
  return data;
};
const reason = 'Tried by the matrix.';
const stale = 999;
const times = { room: '9', opensAt: '2031-01-01T08:00', startsAt: '2031-01-01T08:30', latestStartAt: '2031-01-01T09:00', proctors: [] };
const plan = ({ formId, classId }: Things) => ({ formId, classId, title: secret, ...times });
const content = emptyExam(schoolSettings.parse({}));
const person = { name: `${secret} person`, sortName: '', email: '', learnerNumber: 'MX-person' };
const need = { extraPercent: 5, extraMinutes: 0, restMinutes: 0, largePrint: false, separateRoom: false, reason, since: '2026-01-01', until: '' };
const mark = (things: Things) => ({ candidateId: things.resultId, question: 1, part: 'a', reason });

const bank: Record<string, Action> = {
  newTemplateAction: { own: 'I i', send: ({ slug }) => [{ title: secret, slug: slug === 'no-such-template' ? 'shunt-weakened-field' : slug, area: 'dc-motors', caution: '', level: 2 }] },
  saveDraftAction: { own: 'I i', foreign: '', send: ({ templateId }) => [{ id: templateId, text: secret, revision: stale }] },
  startCheckAction: { own: 'I i', foreign: '', send: ({ templateId }) => [{ id: templateId, draws: 500 }] },
  cancelCheckAction: { own: 'I i', foreign: '', send: ({ checkId }) => [{ id: checkId }] },
  askForReviewAction: { own: 'I i', foreign: '', send: ({ templateId }) => [{ id: templateId, revision: stale, note: '' }] },
  decideReviewAction: { own: 'I i', foreign: '', send: ({ versionId }) => [{ versionId, verdict: 'returned', note: reason }] },
  takeBackAction: { own: 'I i', foreign: '', send: ({ templateId }) => [{ id: templateId }] },
  retireAction: { own: 'I i', foreign: '', send: ({ templateId }) => [{ id: templateId }] },
  saveFormAction: { own: 'I i', foreign: '', send: ({ templateId }) => form({ id: templateId, revision: String(stale), text: secret }, [null]) },
  bringInFilesAction: { own: 'I i', send: () => form({ files: new Blob(['x'], { type: 'text/plain' }) }, [null]) },
};

const exams: Record<string, Action> = {
  newExamAction: { own: 'I i', send: () => [{ title: `${secret} exam` }] },
  saveExamAction: { own: 'I i', foreign: '', send: ({ examId }) => [{ examId, sheet: { title: secret, revision: stale, content } }] },
  askForReviewAction: { own: 'I i', foreign: '', send: ({ examId }) => [{ examId, revision: stale }] },
  returnExamAction: { own: 'I i', foreign: '', send: ({ examId }) => [{ examId, note: reason }] },
  approveExamAction: { own: 'I i', foreign: '', send: ({ examId }) => [{ examId, revision: stale, note: '' }] },
  retireExamAction: { own: 'I i', foreign: '', send: ({ examId }) => [{ examId }] },
};

const sittings: Record<string, Action> = {
  // A class of somebody else and a class that does not exist are both no class to choose.
  planSittingAction: { own: 'I', foreign: '', closed: 'class', send: (things) => [{ ...plan(things), room: '9', latestStartAt: '2031-01-01T08:30', startsAt: '2031-01-01T08:30' }] },
  changeSittingAction: { own: 'I', foreign: '', send: (things) => [things.sittingId, plan(things)] },
  cancelSittingAction: { own: 'I', foreign: '', send: ({ sittingId }) => [{ sittingId, reason }] },
  setSeatsAction: { own: 'I', foreign: '', send: ({ sittingId }) => [{ sittingId, seats: [] }] },
  addCandidatesAction: { own: 'I', foreign: '', send: ({ sittingId, accountId }) => [{ sittingId, accounts: [accountId] }] },
  removeCandidateAction: { own: 'I', foreign: '', send: ({ sittingId, candidateId }) => [{ sittingId, candidateId }] },
  renewNeedsAction: { own: 'I', foreign: '', send: ({ sittingId }) => [{ sittingId }] },
  drawPapersAgainAction: { own: 'I', foreign: '', send: ({ sittingId }) => [{ sittingId }] },
  inviteCandidatesAction: { own: 'I', foreign: '', send: ({ sittingId }) => [{ sittingId }] },
};

const marking: Record<string, Action> = {
  overrideMarkAction: { own: 'I', foreign: '', send: (things) => [{ ...mark(things), issue: stale, awarded: 0 }] },
  decideClaimAction: { own: 'I P', foreign: '', send: (things) => [{ ...mark(things), sequence: 1, decision: 'left out' }] },
  withholdResultAction: { own: 'I', foreign: '', send: ({ resultId }) => [{ candidateId: resultId, withheld: true, reason }] },
  moderateAction: { own: 'I', foreign: '', send: ({ overId }) => [overId] },
  releaseAction: { own: 'I', foreign: '', send: ({ overId }) => [overId] },
};

const records: Record<string, Action> = {
  sealAction: { own: 'R', foreign: 'R', send: ({ overId }) => [overId] },
  issueReportsAction: { own: 'R', foreign: '', send: ({ madeOverId, madeResultId }) => [madeOverId, false, [madeResultId]] },
  sendReportsAction: { own: 'R', foreign: '', send: ({ madeOverId, madeResultId }) => [madeOverId, [madeResultId]] },
  sendAgainAction: { own: '', foreign: '', send: ({ examId }) => [examId] },
};

const people: Record<string, Action> = {
  addPerson: { own: 'R', opens: 'invalid', send: () => [{ ...person, email: 'not-an-address', roles: ['student'] }] },
  saveParticulars: { own: 'R', foreign: '', send: ({ personId }) => [personId, { ...person, learnerNumber: `MX-${personId.slice(0, 8)}` }] },
  saveRoles: { own: 'R', foreign: '', send: ({ personId }) => [personId, ['student']] },
  sendLinkTo: { own: 'R', foreign: '', send: ({ personId }) => [personId] },
  give: { own: 'R', foreign: '', send: ({ personId }) => [personId, need] },
  end: { own: 'R', foreign: '', send: ({ accommodationId }) => [accommodationId] },
  closePerson: { own: 'R', foreign: '', send: ({ personId }) => [personId] },
  reopenPerson: { own: 'R', foreign: '', send: ({ personId }) => [personId] },
};

const classes: Record<string, Action> = {
  storeTerm: { own: 'R', foreign: '', send: ({ madeTermId }) => [madeTermId, { name: `${secret} ${madeTermId.slice(0, 8)}`, startsOn: '2026-01-01', endsOn: '2099-12-31' }] },
  moveTerm: { own: 'R', foreign: '', send: ({ madeTermId }) => [madeTermId, 'open'] },
  // Its term is not there either, and is looked for first.
  storeClass: { own: 'R', foreign: '', closed: 'invalid', send: ({ madeClassId, madeTermId }) => [madeClassId, { termId: madeTermId, name: `MX-${madeClassId.slice(0, 8)}`, title: '', instructorIds: [] }] },
  enrolIn: { own: 'R', foreign: '', send: ({ madeClassId, personId }) => [madeClassId, [personId]] },
  takeOutOf: { own: 'R', foreign: '', send: ({ madeClassId, accountId }) => [madeClassId, [accountId]] },
  slipsFor: { own: 'R', send: ({ personId }) => [[personId]] },
};

const rosters: Record<string, Action> = {
  preview: { own: 'R', send: ({ madeTermId }) => form({ file: new Blob(['name,learner number\n']), termId: madeTermId }) },
  takeIn: { own: 'R', foreign: '', send: ({ importId }) => [importId] },
  drop: { own: 'R', foreign: '', send: ({ droppedId }) => [droppedId] },
};

const others: Record<string, Action> = {
  'app/(staff)/school/actions.ts#storeSchool': { own: 'R', send: () => [{ ...schoolSettings.parse({}), name: secret, version: stale } satisfies Partial<ReturnType<typeof schoolForm.parse>>] },
  'app/(staff)/sittings/[sittingId]/board/actions.ts#actOnBoard': { own: 'P', foreign: '', send: ({ sittingId }) => [sittingId, { do: 'incident', candidate: null, words: reason }] },
  'app/(room)/rehearse/actions.ts#finishRehearsal': { own: 'S s', send: () => [] },
  'app/account/actions.ts#changeOwnPassword': { own: 'S s I i P p R', send: () => [{ current: 'not this one', password: 'nor this one 99' }] },
  'app/(public)/actions.ts#askForReset': { own: 'N S s I i P p R', send: () => [{ identifier: 'nobody@matrix.test' }] },
  'app/(public)/actions.ts#choosePassword': { own: 'N S s I i P p R', send: ({ examId }) => ['reset', { token: examId, password: 'nor this one 99' }] },
  'app/account/actions.ts#signOutEverywhere': { own: 'N S s I i P p R', send: () => [], opens: 'elsewhere' },
  'app/sign-out.ts#signOut': { own: 'N S s I i P p R', send: () => [], opens: 'elsewhere' },
};

const inFile = (file: string, rows: Record<string, Action>): [string, Action][] => Object.entries(rows).map(([name, action]) => [`${file}#${name}`, action]);

/** Every server action, by file and name. Those that end a sign-in come last. */
export const actions: Record<string, Action> = Object.fromEntries([
  ...inFile('app/(staff)/bank/actions.ts', bank), ...inFile('app/(staff)/exams/actions.ts', exams), ...inFile('app/(staff)/sittings/actions.ts', sittings),
  ...inFile('app/(staff)/marking/actions.ts', marking), ...inFile('app/(staff)/records/actions.ts', records), ...inFile('app/(staff)/people/actions.ts', people),
  ...inFile('app/(staff)/people/classes/actions.ts', classes), ...inFile('app/(staff)/people/import/actions.ts', rosters), ...Object.entries(others),
]);
