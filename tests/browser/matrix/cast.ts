import { randomUUID } from 'node:crypto';
import { type Database, openDatabase } from '@/db/client';
import { readClock } from '@/db/clock';
import { giveAccommodation } from '@/lib/accommodations/commands';
import { saveDraft, newTemplate } from '@/lib/bank/commands';
import { admit } from '@/lib/candidates/commands';
import { handIn, takeSeat } from '@/lib/candidates/seat-commands';
import type { Seat } from '@/lib/candidates/seat-token';
import { enrol, saveClass, saveTerm } from '@/lib/classes/commands';
import type { Role } from '@/lib/context';
import { staff } from '@/lib/demo/cast';
import { asAccount } from '@/lib/demo/stage';
import { newExam } from '@/lib/exams/commands';
import { planSitting } from '@/lib/planning/commands';
import { drawPapers } from '@/lib/planning/jobs';
import { issueReports } from '@/lib/reports/commands';
import { moderateSitting, releaseResults, sealResults } from '@/lib/results/commands';
import { markSitting } from '@/lib/results/marking';
import { previewRoster } from '@/lib/rosters/commands';
import { readSchool } from '@/lib/school/queries';
import { localDay, toLocal } from '@/lib/school/times';
import { closeSitting, openCheckIn, reconcileSitting, startSitting } from '@/lib/sittings/commands';
import { valueOf } from '../../support/exams';
import { goodPassword, newPerson, type Person } from '../../support/people';
import { signInOver } from '../../support/sign-in';
import type { Who } from './table';

/** Things that an address or an action can name. All ids are of one set: own, somebody else's, or of nothing that exists. */
export type Things = {
  sittingId: string; plannedId: string; overId: string; candidateId: string; resultId: string; classId: string; accountId: string; termId: string; formId: string;
  accommodationId: string; templateId: string; slug: string; versionId: string; checkId: string; examId: string; importId: string; droppedId: string; reportId: string; token: string; mailId: string;
  /** Things that a registrar may change although they are another's: made for the matrix alone, so that nothing of the demo changes. */
  madeTermId: string; madeClassId: string; madeOverId: string; madeResultId: string; personId: string;
};

export type Cast = { db: Database; cookies: Record<Who, string>; own: Things; foreign: Things; missing: Things; seats: { own: Seat; foreign: Seat }; close(): Promise<void> };

/** Stands in what belongs to these people, and must be in no answer to anybody else. */
export const secret = 'Zirconium';
const minute = 60_000;

const roleOf: Record<Exclude<Who, 'nobody'>, Role> = {
  student: 'student', otherStudent: 'student', instructor: 'instructor', otherInstructor: 'instructor', proctor: 'proctor', otherProctor: 'proctor', registrar: 'registrar',
};
type People = Record<Exclude<Who, 'nobody'>, Person>;

async function hire(db: Database): Promise<People> {
  const petra = await db.selectFrom('account').select(['id', 'name']).where('name', '=', staff.registrar.name).executeTakeFirstOrThrow();
  const by = asAccount(db, petra.id, petra.name, ['registrar']) as Person['context'] & { id: string };
  const people: Partial<People> = {};
  for (const [who, role] of Object.entries(roleOf) as [Exclude<Who, 'nobody'>, Role][]) {
    const tag = randomUUID().slice(0, 8);
    people[who] = await newPerson({ id: by.id, context: by }, [role], { name: `${secret} ${who}`, email: `${who.toLowerCase()}-${tag}@matrix.test`, learnerNumber: `MX-${tag}` });
  }
  return people as People;
}

type Stage = { db: Database; people: People; formId: string; classId: string };

async function schedule({ db, people, formId, classId }: Stage, title: string): Promise<string> {
  const { settings } = await readSchool(db);
  const now = (await readClock(db)).getTime();
  const at = (minutes: number) => toLocal(new Date(now + minutes * minute), settings);
  const { sittingId } = valueOf(await planSitting(people.instructor.context, {
    formId, classId, title: `${secret} ${title}`, room: '9', proctors: [people.proctor.id], opensAt: at(-2), startsAt: at(-1), latestStartAt: at(600),
  }));
  valueOf(await drawPapers(db, { sittingId }));
  return sittingId;
}

/** Runs a sitting with its one candidate writing. */
async function run({ db, people }: Stage, sittingId: string): Promise<{ seat: Seat; candidateId: string }> {
  const proctor = people.proctor.context;
  valueOf(await openCheckIn(proctor, sittingId));
  const { id } = await db.selectFrom('candidate').select('id').where('sitting_id', '=', sittingId).executeTakeFirstOrThrow();
  valueOf(await admit(proctor, sittingId, [id]));
  const seat = valueOf(await takeSeat(people.student.context, sittingId, 'matrix-device-0123456789'));
  if (!seat) throw new Error('No seat.');
  valueOf(await startSitting(proctor, sittingId));
  return { seat, candidateId: id };
}

async function finish({ db, people }: Stage, sittingId: string): Promise<{ seat: Seat; resultId: string; reportId: string }> {
  const { seat, candidateId } = await run({ db, people, formId: '', classId: '' }, sittingId);
  valueOf(await handIn(people.student.context, seat));
  valueOf(await closeSitting(people.proctor.context, sittingId));
  valueOf(await reconcileSitting(people.proctor.context, sittingId));
  await markSitting(db, sittingId);
  valueOf(await moderateSitting(people.instructor.context, sittingId));
  valueOf(await releaseResults(people.instructor.context, sittingId));
  valueOf(await sealResults(people.registrar.context, sittingId));
  valueOf(await issueReports(people.registrar.context, { sittingId, candidateIds: [candidateId] }));
  const report = await db.selectFrom('report').select('id').where('candidate_id', '=', candidateId).executeTakeFirstOrThrow();
  return { seat, resultId: candidateId, reportId: report.id };
}

async function bankThings(db: Database, { instructor }: People): Promise<Pick<Things, 'templateId' | 'slug' | 'versionId' | 'checkId'>> {
  const made = valueOf(await newTemplate(instructor.context, { title: `${secret} template`, slug: `matrix-${randomUUID().slice(0, 8)}`, area: 'dc-motors', caution: 'live-test', level: 2 }));
  valueOf(await saveDraft(instructor.context, { id: made.id, text: `${secret}: a text that does not read`, revision: 1 }));
  const version = await db.selectFrom('template_version').select('id').limit(1).executeTakeFirstOrThrow();
  const check = await db.insertInto('template_check').values({ template_id: made.id, text: secret, text_digest: 'none', draws: 500, state: 'failed' }).returning('id').executeTakeFirstOrThrow();
  return { templateId: made.id, slug: made.slug, versionId: version.id, checkId: check.id };
}

/** What the demo has and none of these people has to do with, except that a registrar sees it. */
async function demoThings(db: Database): Promise<{ things: Things; seat: Seat }> {
  const one = (state: string) => db.selectFrom('candidate').innerJoin('sitting', 'sitting.id', 'candidate.sitting_id').innerJoin('class', 'class.id', 'sitting.class_id')
    .where('sitting.state', '=', state).where('class.name', 'in', ['E2-A', 'E2-B', 'E3-A']).orderBy('candidate.epoch', 'desc').orderBy('candidate.device', 'desc')
    .select(['sitting.id as sittingId', 'candidate.id', 'candidate.account_id', 'candidate.device', 'candidate.epoch', 'class.id as classId', 'class.term_id', 'sitting.form_id']).executeTakeFirstOrThrow();
  const [planned, over] = [await one('planned'), await one('reconciled')];
  const report = await db.selectFrom('report').select('id').executeTakeFirst();
  const nothing = noThings();
  const things = {
    ...nothing, sittingId: planned.sittingId, plannedId: planned.sittingId, overId: over.sittingId, candidateId: planned.id, resultId: over.id, classId: over.classId, accountId: over.account_id,
    termId: over.term_id, formId: over.form_id, reportId: report?.id ?? nothing.reportId,
  };
  return { things, seat: { sittingId: over.sittingId, candidateId: over.id, device: over.device, epoch: over.epoch } };
}

function noThings(): Things {
  const names = [
    'sittingId', 'plannedId', 'overId', 'candidateId', 'resultId', 'classId', 'accountId', 'termId', 'formId', 'accommodationId', 'templateId', 'versionId', 'checkId', 'examId', 'importId', 'droppedId',
    'reportId', 'madeTermId', 'madeClassId', 'madeOverId', 'madeResultId', 'personId',
  ] as const;
  const ids = Object.fromEntries(names.map((name) => [name, randomUUID()])) as Record<(typeof names)[number], string>;
  return { ...ids, slug: 'no-such-template', token: 'no-such-token', mailId: '999999999' };
}

/** Hires one person for each column of the table, beside the demo's own, and makes a class, sittings and things of every kind for them. */
export async function makeCast(url: string, databaseUrl: string): Promise<Cast> {
  const db = openDatabase(databaseUrl, 'fullfield_app', { max: 4 });
  const people = await hire(db);
  const { registrar, instructor, student } = people;
  const { settings } = await readSchool(db);
  const today = localDay(await readClock(db), settings);
  const { id: termId } = valueOf(await saveTerm(registrar.context, null, { name: `Term ${randomUUID().slice(0, 8)}`, startsOn: today, endsOn: '2099-12-31' }));
  const bystander = await newPerson(registrar, ['student'], { name: `${secret} bystander`, email: `bystander-${randomUUID()}@matrix.test`, learnerNumber: `MX-${randomUUID().slice(0, 8)}` });
  const { id: formId } = await db.selectFrom('form').select('id').orderBy('approved_at').limit(1).executeTakeFirstOrThrow();
  const { id: classId } = valueOf(await saveClass(registrar.context, null, { termId, name: `MX-${randomUUID().slice(0, 8)}`, title: secret, instructorIds: [instructor.id] }));
  valueOf(await enrol(registrar.context, classId, [student.id]));
  const needs = { extraPercent: 0, extraMinutes: 5, restMinutes: 0, largePrint: false, separateRoom: false, reason: secret, since: today, until: '' };
  const { id: accommodationId } = valueOf(await giveAccommodation(registrar.context, student.id, needs));
  const { examId } = valueOf(await newExam(instructor.context, { title: `${secret} exam` }));
  const roster = { fileName: `${secret}.csv`, bytes: new TextEncoder().encode(`name,learner number\n${secret} Learner,MX-9\n`), termId, makeClasses: false, invite: false };
  const { id: importId } = valueOf(await previewRoster(registrar.context, roster));
  const { id: droppedId } = valueOf(await previewRoster(registrar.context, roster));
  const stage = { db, people, formId, classId };
  const [plannedId, overId, sittingId] = [await schedule(stage, 'ahead'), await schedule(stage, 'over'), await schedule(stage, 'now')];
  const over = await finish(stage, overId);
  const { seat, candidateId } = await run(stage, sittingId);
  const own = {
    ...noThings(), ...(await bankThings(db, people)), sittingId, plannedId, overId, candidateId, resultId: over.resultId, reportId: over.reportId, classId, accountId: student.id, termId, formId,
    accommodationId, examId, importId, droppedId, madeTermId: termId, madeClassId: classId, madeOverId: overId, madeResultId: over.resultId, personId: bystander.id,
  };
  const demo = await demoThings(db);
  const cookies: Partial<Record<Who, string>> = { nobody: '' };
  for (const who of Object.keys(roleOf) as Exclude<Who, 'nobody'>[]) {
    const { email } = await db.selectFrom('account').select('email').where('id', '=', people[who].id).executeTakeFirstOrThrow();
    cookies[who] = await signInOver(url, email ?? '', goodPassword);
  }
  return { db, cookies: cookies as Record<Who, string>, own, foreign: demo.things, missing: noThings(), seats: { own: seat, foreign: demo.seat }, close: () => db.destroy() };
}
