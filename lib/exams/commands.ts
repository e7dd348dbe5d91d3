import { createHash } from 'node:crypto';
import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { canonical } from '@/lib/audit/model';
import { accountId, type Context, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { emptyExam, examSheet, type ExamSheet, type ExamState, examTitle } from './model';
import { mayUseExams } from './policy';
import { readContent, versionIdsOf, versionsById } from './queries';
import { type ExamEvent, nextExamState } from './rules';
import { examProblems, sumsOf } from './sums';

/** A new exam in draft, with the school's rule and declaration. */
export async function newExam(context: Context, input: { title: string }): Promise<Result<{ examId: string }>> {
  const me = accountId(context.actor);
  if (!me || !mayUseExams(context.actor)) return notFound();
  const title = examTitle.safeParse(input.title);
  if (!title.success) return refuse('invalid', title.error.issues[0]?.message ?? 'Give the exam a title.', 'title');
  return inTransaction(context, async (locked) => {
    const { settings } = await readSchool(locked.db);
    const { id } = await locked.db
      .insertInto('exam')
      .values({ title: title.data, content: JSON.stringify(emptyExam(settings)), owner_id: me, changed_by: me, writers: [me] })
      .returning('id')
      .executeTakeFirstOrThrow();
    await record(locked, { kind: 'exam.made', subject: 'exam', subjectId: id });
    return done({ examId: id });
  });
}

const lockExam = (context: LockingContext, examId: string) =>
  context.db.selectFrom('exam').selectAll().where('id', '=', examId).forUpdate().executeTakeFirst();
type LockedExam = NonNullable<Awaited<ReturnType<typeof lockExam>>>;
type Mine = LockingContext & { me: string };

/** Authorises, locks the exam and runs `work`; missing and forbidden look alike. */
async function withExam<Value>(context: Context, examId: string, work: (mine: Mine, exam: LockedExam) => Promise<Result<Value>>): Promise<Result<Value>> {
  const me = accountId(context.actor);
  if (!me || !mayUseExams(context.actor) || !isId(examId)) return notFound();
  return inTransaction(context, async (locked) => {
    const exam = await lockExam(locked, examId);
    return exam ? work({ ...locked, me }, exam) : notFound();
  });
}

const move = (exam: LockedExam, event: ExamEvent) => nextExamState(exam.state as ExamState, event);
const changedSince = () =>
  refuse('changed-since', 'Somebody else changed this exam meanwhile. Keep this page open, look at the exam in another tab, and repeat your change on the latest text.');

/** Stores the sheet. Refused when the exam changed since it was read, so that nobody's change is lost. */
export async function saveExam(context: Context, examId: string, sheet: ExamSheet): Promise<Result<{ revision: number; state: ExamState }>> {
  const input = examSheet.parse(sheet);
  return withExam(context, examId, async (mine, exam) => {
    if (exam.revision !== input.revision) return changedSince();
    const next = move(exam, { kind: 'edit' });
    if (!next.ok) return next;
    const writers = exam.state === 'approved' ? [mine.me] : [...new Set([...exam.writers, mine.me])];
    const revision = exam.revision + 1;
    await mine.db
      .updateTable('exam')
      .set({ title: input.title, content: JSON.stringify(input.content), revision, state: next.value, writers, changed_by: mine.me, changed_at: sql<Date>`app.now()` })
      .where('id', '=', exam.id)
      .execute();
    await record(mine, { kind: 'exam.saved', subject: 'exam', subjectId: exam.id, data: { revision } });
    return done({ revision, state: next.value });
  });
}

const stopping = async (mine: Mine, exam: LockedExam) => {
  const content = readContent(exam.content);
  const versions = await versionsById(mine, versionIdsOf(content));
  return { content, versions, stop: examProblems(content, versions).find((problem) => problem.stops) };
};

/** Sends a draft to a second instructor. Refused while something on it must be put right. */
export async function askForReview(context: Context, examId: string, revision: number): Promise<Result<{ state: ExamState }>> {
  return withExam(context, examId, async (mine, exam) => {
    if (exam.revision !== revision) return changedSince();
    const next = move(exam, { kind: 'ask for review' });
    if (!next.ok) return next;
    const { stop } = await stopping(mine, exam);
    if (stop) return refuse(stop.code, stop.says);
    await mine.db.updateTable('exam').set({ state: next.value, review_asked_by: mine.me, review_note: '', changed_at: sql<Date>`app.now()` }).where('id', '=', exam.id).execute();
    await record(mine, { kind: 'exam.review-asked', subject: 'exam', subjectId: exam.id, data: { revision } });
    return done({ state: next.value });
  });
}

/** Back to draft, with what has to change. The asker may take it back too. */
export async function returnExam(context: Context, examId: string, note: string): Promise<Result<{ state: ExamState }>> {
  return withExam(context, examId, async (mine, exam) => {
    const next = move(exam, { kind: 'return' });
    if (!next.ok) return next;
    const text = note.trim().slice(0, 2_000);
    if (text === '' && exam.review_asked_by !== mine.me) return refuse('note', 'Say what has to change before you return it.', 'note');
    await mine.db.updateTable('exam').set({ state: next.value, review_note: text, review_asked_by: null, changed_at: sql<Date>`app.now()` }).where('id', '=', exam.id).execute();
    await record(mine, { kind: 'exam.returned', subject: 'exam', subjectId: exam.id, data: { revision: exam.revision }, note: text || undefined });
    return done({ state: next.value });
  });
}

/** SHA-256 [hex] of what a form is: its content and the texts and digests of its versions. */
const digestOf = (title: string, content: unknown, versions: readonly { id: string; text: string; digests: unknown; engine: string }[]): string =>
  createHash('sha256').update(canonical([title, content, versions])).digest('hex');

async function freeze(mine: Mine, exam: LockedExam, loaded: Awaited<ReturnType<typeof stopping>>): Promise<{ formId: string; number: number }> {
  const { content, versions } = loaded;
  const ids = versionIdsOf(content);
  const texts = await mine.db.selectFrom('template_version').where('id', 'in', ids).select(['id', 'text', 'digests', 'engine']).orderBy('id').execute();
  const last = await mine.db.selectFrom('form').where('exam_id', '=', exam.id).select(({ fn }) => fn.max('number').as('number')).executeTakeFirst();
  const number = (last?.number ?? 0) + 1;
  const { id: formId } = await mine.db
    .insertInto('form')
    .values({
      exam_id: exam.id, number, title: exam.title, content: JSON.stringify(content), marks: sumsOf(content, versions).marks,
      minutes: content.minutes, approved_by: mine.me, digest: digestOf(exam.title, content, texts),
    })
    .returning('id')
    .executeTakeFirstOrThrow();
  const items = content.sections.flatMap((section, index) => section.items.map((item) => ({ section: index + 1, template_version_id: item.versionId })));
  await mine.db.insertInto('form_item').values(items.map((item, index) => ({ ...item, form_id: formId, question: index + 1 }))).execute();
  return { formId, number };
}

/** Approval by a second instructor: freezes the exam as its next form. Every version used must be approved at this moment. */
export async function approveExam(context: Context, examId: string, input: { revision: number; note: string }): Promise<Result<{ formId: string; number: number }>> {
  return withExam(context, examId, async (mine, exam) => {
    if (exam.revision !== input.revision) return changedSince();
    const next = move(exam, { kind: 'approve', by: mine.me, askedBy: exam.review_asked_by, writers: exam.writers });
    if (!next.ok) return next;
    // Reviews of these versions stay as they are until the form stands.
    const ids = versionIdsOf(readContent(exam.content));
    if (ids.length > 0) await mine.db.selectFrom('template_review').where('version_id', 'in', ids).select('version_id').forShare().execute();
    const loaded = await stopping(mine, exam);
    if (loaded.stop) return refuse(loaded.stop.code, loaded.stop.says);
    const form = await freeze(mine, exam, loaded);
    const note = input.note.trim().slice(0, 2_000);
    await mine.db.updateTable('exam').set({ state: next.value, review_note: note, writers: [], changed_at: sql<Date>`app.now()` }).where('id', '=', exam.id).execute();
    await record(mine, { kind: 'exam.approved', subject: 'exam', subjectId: exam.id, data: { revision: exam.revision, form: form.formId, number: form.number }, note: note || undefined });
    return done(form);
  });
}

/** No new sitting can be scheduled with its forms; what is scheduled stays. */
export async function retireExam(context: Context, examId: string): Promise<Result<{ state: ExamState }>> {
  return withExam(context, examId, async (mine, exam) => {
    const next = move(exam, { kind: 'retire' });
    if (!next.ok) return next;
    await mine.db.updateTable('exam').set({ state: next.value, changed_at: sql<Date>`app.now()` }).where('id', '=', exam.id).execute();
    await record(mine, { kind: 'exam.retired', subject: 'exam', subjectId: exam.id });
    return done({ state: next.value });
  });
}
