import type { Things } from './cast';

/**
 * Who asks, with one letter each in the tables: N nobody signed in; S the student whose it is, s another student; I an instructor of the class,
 * i another instructor; P a proctor assigned, p another proctor; R a registrar.
 */
export const whoBy = { N: 'nobody', S: 'student', s: 'otherStudent', I: 'instructor', i: 'otherInstructor', P: 'proctor', p: 'otherProctor', R: 'registrar' } as const;
export type Who = (typeof whoBy)[keyof typeof whoBy];
export const everybody = Object.values(whoBy);
export type Letters = string;

export const peopleOf = (letters: Letters): ReadonlySet<Who> => new Set(letters.split(' ').filter(Boolean).map((letter) => whoBy[letter as keyof typeof whoBy]));

/** Who gets in: to a thing of their own, to somebody else's. To what does not exist gets nobody. Without `foreign` the address names no thing. */
export type Gate = { own: Letters; foreign?: Letters };

const anybody = 'N S s I i P p R';
const members = 'S s I i P p R';

/** Every page, by its folder in app. `with`: which of the things stands in the address where the name of the segment does not say it. */
export const pages: Record<string, Gate & { with?: Partial<Record<string, keyof Things>>; open?: true }> = {
  '/': { own: '', open: true },
  '/(public)/sign-in': { own: anybody, open: true },
  '/(public)/slip': { own: anybody, open: true },
  '/(public)/reset': { own: anybody, open: true },
  '/(public)/reset/[token]': { own: anybody, open: true },
  '/(public)/invitation/[token]': { own: anybody, open: true },
  '/(public)/mail': { own: anybody, open: true },
  '/(public)/mail/[mailId]': { own: anybody, open: true },
  '/(public)/parts': { own: anybody, open: true },
  // A shell without anybody's data; what is in the room comes through its handlers.
  '/(room)/sit/[sittingId]': { own: anybody, open: true },
  '/(room)/rehearse': { own: 'S s' },
  '/(student)/today': { own: 'S s' },
  '/(student)/results': { own: 'S s' },
  '/(student)/results/[candidateId]': { own: 'S', foreign: '', with: { candidateId: 'resultId' } },
  '/account': { own: members },
  '/(staff)/bank': { own: 'I i' },
  '/(staff)/bank/new': { own: 'I i' },
  '/(staff)/bank/files': { own: 'I i' },
  '/(staff)/bank/[slug]': { own: 'I i', foreign: '' },
  '/(staff)/exams': { own: 'I i' },
  '/(staff)/exams/[examId]': { own: 'I i', foreign: '' },
  '/(staff)/exams/[examId]/paper': { own: 'I i', foreign: '' },
  '/(staff)/sittings': { own: 'I i P p R' },
  '/(staff)/sittings/new': { own: 'I i' },
  '/(staff)/sittings/[sittingId]': { own: 'I P R', foreign: 'R' },
  '/(staff)/sittings/[sittingId]/plan': { own: 'I', foreign: '', with: { sittingId: 'plannedId' } },
  '/(staff)/sittings/[sittingId]/board': { own: 'I P R', foreign: 'R' },
  '/(staff)/marking': { own: 'I i' },
  '/(staff)/marking/[sittingId]': { own: 'I', foreign: '', with: { sittingId: 'overId' } },
  '/(staff)/marking/[sittingId]/[candidateId]': { own: 'I', foreign: '', with: { sittingId: 'overId', candidateId: 'resultId' } },
  '/(staff)/records': { own: 'I i R' },
  '/(staff)/records/[sittingId]': { own: 'I R', foreign: 'R', with: { sittingId: 'overId' } },
  '/(staff)/people': { own: 'R' },
  '/(staff)/people/new': { own: 'R' },
  '/(staff)/people/terms': { own: 'R' },
  '/(staff)/people/import': { own: 'R' },
  '/(staff)/people/import/[importId]': { own: 'R', foreign: '' },
  '/(staff)/people/classes': { own: 'R' },
  '/(staff)/people/classes/[classId]': { own: 'R', foreign: 'R' },
  '/(staff)/people/[accountId]': { own: 'R', foreign: 'R' },
  '/(staff)/school': { own: 'R' },
};

const preview = { text: 'template: x', seed: 'one' };

/** Every handler for which a sign-in is the right of way, by method and folder. */
export const handlers: Record<string, Gate & { body?: unknown; query?: string; with?: Partial<Record<string, keyof Things>> }> = {
  'GET /api/bank/checks/[checkId]': { own: 'I i', foreign: '' },
  'GET /api/bank/templates/[templateId]': { own: 'I i', foreign: '' },
  'GET /api/bank/versions/[versionId]': { own: 'I i', foreign: '' },
  'POST /api/bank/preview': { own: 'I i', body: preview },
  'POST /api/exams/markdown': { own: 'I i', body: { text: 'x' } },
  'GET /api/find': { own: 'I i P p R', query: '?q=an' },
  'GET /api/reports/[reportId]': { own: 'S I R', foreign: 'R' },
  'GET /api/sittings/[sittingId]/board': { own: 'I P R', foreign: 'R' },
  'GET /api/sittings/[sittingId]/board/stream': { own: 'I P R', foreign: 'R' },
  'GET /api/sittings/[sittingId]/papers': { own: 'I P R', foreign: 'R' },
  'GET /api/sittings/[sittingId]/timeline': { own: 'I P R', foreign: 'R' },
  'POST /api/sit/[sittingId]/seat': { own: 'S', foreign: '', body: { device: 'matrix-device-0123456789' } },
};

/** Every handler for which the device's seat is the right of way, with what it is sent. Each opens for the own seat and nothing else. */
export const seatHandlers: Record<string, unknown> = {
  'GET /api/sit/[sittingId]/state': undefined,
  'GET /api/sit/[sittingId]/stream': undefined,
  'GET /api/sit/[sittingId]/paper': undefined,
  'POST /api/sit/[sittingId]/declare': {},
  'POST /api/sit/[sittingId]/flags': { question: 1, sequence: 1, flagged: true },
  'POST /api/sit/[sittingId]/help': {},
  'POST /api/sit/[sittingId]/responses': { revisions: [{ question: 1, part: 'a', sequence: 1, answer: '1 A', typedAt: 0 }] },
  'POST /api/sit/[sittingId]/hand-in': {},
};

/** Handlers that tell everybody the same. */
export const openHandlers: Record<string, number> = {
  'GET /api/health': 200,
  'GET /api/auth/[...nextauth]': 200,
  'POST /api/auth/[...nextauth]': 400,
  'POST /api/bare': 200,
  'GET /mail/[mailId]/files/[place]': 404,
};
