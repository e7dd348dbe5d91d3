import { readFileSync } from 'node:fs';
import { randomUUID } from 'node:crypto';
import { libraryDigests, loadLibrary } from '@/lib/bank/library';
import { admit } from '@/lib/candidates/commands';
import { saveResponses } from '@/lib/candidates/save';
import { takeSeat } from '@/lib/candidates/seat-commands';
import type { Seat } from '@/lib/candidates/seat-token';
import type { Context } from '@/lib/context';
import { approveExam, askForReview, newExam, saveExam } from '@/lib/exams/commands';
import { type ExamContent, emptyExam } from '@/lib/exams/model';
import { drawPapers } from '@/lib/planning/jobs';
import { planSitting } from '@/lib/planning/commands';
import { schoolSettings } from '@/lib/school/model';
import { closeSitting, openCheckIn, reconcileSitting, startSitting } from '@/lib/sittings/commands';
import type { Draw } from '@/lib/templates/draw';
import { parseTemplate } from '@/lib/templates/parse';
import { marksOf } from '@/lib/templates/plan';
import type { TestDatabase } from './database';
import { type Version, valueOf } from './exams';
import { makeAccount } from './room';

export type Person = Context & { id: string };
export type Writer = { name: string; candidateId: string; person: Person; seat: Seat | null };
export type Written = {
  sittingId: string; ivo: Person; mara: Person; piet: Person; clerk: Person; writers: Writer[];
  draws(candidateId: string): Promise<Draw[]>;
};

const library = loadLibrary();

/** A template of question-templates as the bank keeps it after a review. */
async function bankVersion(database: TestDatabase, author: string, decider: string, file: string): Promise<Version> {
  const text = readFileSync(`question-templates/${file}.yaml`, 'utf8');
  const parsed = parseTemplate(text, library);
  if (!parsed.ok) throw new Error(parsed.problems.map((problem) => problem.says).join('\n'));
  const { head, plan } = parsed.template;
  const facts = { title: head.title, area: head.area, level: head.level, minutes: head.minutes, marks: marksOf(parsed.template), kinds: plan.parts.map((part) => part.kind) };
  const { owner } = database;
  const template = await owner.insertInto('template').values({ slug: `${head.template}-${randomUUID()}`, state: 'approved', text, ...facts, owner_id: author }).returning('id').executeTakeFirstOrThrow();
  const version = await owner.insertInto('template_version')
    .values({ template_id: template.id, number: 1, text, digests: JSON.stringify(libraryDigests(library)), engine: 'fullfield-1', ...facts, author_id: author, writers: [author] })
    .returning('id').executeTakeFirstOrThrow();
  await owner.insertInto('template_review').values({ version_id: version.id, asked_by: author, verdict: 'approved', decided_by: decider, decided_at: new Date() }).execute();
  return { templateId: template.id, versionId: version.id };
}

async function frozenForm(ivo: Person, mara: Person, sections: ExamContent['sections'], passPercent: number): Promise<string> {
  const empty = emptyExam(schoolSettings.parse({}));
  const content: ExamContent = { ...empty, minutes: 60, sections, passRule: { overallPercent: passPercent, rounding: 'tenth' } };
  const { examId } = valueOf(await newExam(ivo, { title: 'Direct-current machines' }));
  const { revision } = valueOf(await saveExam(ivo, examId, { title: 'Direct-current machines', revision: 1, content }));
  valueOf(await askForReview(ivo, examId, revision));
  return valueOf(await approveExam(mara, examId, { revision, note: '' })).formId;
}

/**
 * A sitting of one motor question (3 parts, 6 marks) and one generator question (4 parts, 6 marks), planned, drawn and started through the
 * commands of the program. `names` are the students; the last one never comes.
 */
export async function startedSitting(database: TestDatabase, names: readonly string[]): Promise<Written> {
  const { owner, app } = database;
  await database.setClock(new Date('2026-12-08T15:00:00Z'));
  await owner.updateTable('school').set({ name: 'Kettle Ridge Trades College', settings: JSON.stringify({ zone: 'America/Edmonton', office: 'Exam office' }) }).execute();
  const [ivo, mara] = [await makeAccount(owner, app, 'Ivo Instructor', 'instructor'), await makeAccount(owner, app, 'Mara Instructor', 'instructor')];
  const [piet, clerk] = [await makeAccount(owner, app, 'Piet Proctor', 'proctor'), await makeAccount(owner, app, 'Rea Registrar', 'registrar')];
  const students: Person[] = [];
  for (const name of names) students.push(await makeAccount(owner, app, name, 'student'));
  const sections = [];
  for (const [title, file] of [['Motors', 'dc-motors/shunt-weakened-field'], ['Generators', 'dc-generators/shunt-generator-emf']] as const) {
    sections.push({ title, instructions: '', leastPercent: title === 'Motors' ? 50 : null, items: [await bankVersion(database, ivo.id, mara.id, file)] });
  }
  const formId = await frozenForm(ivo, mara, sections, 70);
  const term = await owner.insertInto('term').values({ name: `Autumn ${randomUUID()}`, starts_on: '2026-09-01', ends_on: '2026-12-20' }).returning('id').executeTakeFirstOrThrow();
  const { id: classId } = await owner.insertInto('class').values({ term_id: term.id, name: 'E2-A' }).returning('id').executeTakeFirstOrThrow();
  await owner.insertInto('class_instructor').values({ class_id: classId, account_id: ivo.id }).execute();
  await owner.insertInto('enrolment').values(students.map((student) => ({ class_id: classId, account_id: student.id, since: '2026-09-01' }))).execute();
  const plan = { formId, classId, title: 'Machines, period 2', room: '114', opensAt: '2026-12-08T07:30', startsAt: '2026-12-08T08:30', latestStartAt: '2026-12-08T09:00', proctors: [piet.id] };
  const { sittingId } = valueOf(await planSitting(ivo, { ...plan, opensAt: '2026-12-08T08:00', startsAt: '2026-12-08T08:05' }));
  valueOf(await drawPapers(app, { sittingId }));
  valueOf(await openCheckIn(piet, sittingId));
  const rows = await owner.selectFrom('candidate').select(['id', 'account_id']).where('sitting_id', '=', sittingId).execute();
  const idOf = (person: Person) => rows.find((row) => row.account_id === person.id)?.id ?? '';
  const present = students.slice(0, -1);
  valueOf(await admit(piet, sittingId, present.map(idOf)));
  const writers: Writer[] = [];
  for (const [place, person] of students.entries()) {
    const seat = place < present.length ? valueOf(await takeSeat(person, sittingId, `device-${place}-0123456789`)) : null;
    writers.push({ name: names[place] ?? '', candidateId: idOf(person), person, seat });
  }
  valueOf(await startSitting(piet, sittingId));
  const draws = async (candidateId: string) =>
    (await owner.selectFrom('paper_key').select('draw').where('candidate_id', '=', candidateId).orderBy('question').execute()).map((row) => row.draw as unknown as Draw);
  return { sittingId, ivo, mara, piet, clerk, writers, draws };
}

let sequence = 0;
/** Saves answers of a candidate as the room does; `answers[question - 1]` by part. */
export async function write(database: TestDatabase, writer: Writer, answers: readonly Record<string, string>[]): Promise<void> {
  if (!writer.seat) throw new Error(`${writer.name} has no seat.`);
  const revisions = answers.flatMap((parts, index) => Object.entries(parts).map(([part, answer]) => ({ question: index + 1, part, sequence: (sequence += 1), answer, typedAt: 0 })));
  const saved = await saveResponses(database.candidate, writer.seat, revisions);
  if (!saved.ok || saved.saved.length !== revisions.length) throw new Error('Not everything was saved.');
}

/** What is right on a candidate's paper, as it would be typed or taken, by question and part. */
export async function rightAnswers(written: Written, writer: Writer): Promise<Record<string, string>[]> {
  return (await written.draws(writer.candidateId)).map((draw) => Object.fromEntries(draw.parts.map((part) => [part.part, part.options?.find((option) => option.right)?.option ?? part.key.text])));
}

export async function closed(written: Written): Promise<void> {
  valueOf(await closeSitting(written.piet, written.sittingId));
  valueOf(await reconcileSitting(written.piet, written.sittingId));
}
