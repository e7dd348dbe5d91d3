import { openDatabase } from '@/db/client';
import { admit } from '@/lib/candidates/commands';
import type { Context, Role } from '@/lib/context';
import { addressOf, school, staff, type StaffKey } from '@/lib/demo/cast';
import { planSitting } from '@/lib/planning/commands';
import { drawPapers } from '@/lib/planning/jobs';
import type { Result } from '@/lib/result';
import { toLocal } from '@/lib/school/times';
import { closeSitting, openCheckIn, startSitting } from '@/lib/sittings/commands';
import type { Draw } from '@/lib/templates/draw';
import { valueOf } from '../../support/exams';
import { database, serverNow } from './database';

const minute = 60_000;
const place = { zone: school.zone, locale: 'en-CA' } as const;

/** A time so many minutes from the installation's now, as a date-and-time field of the school takes it. */
export const inMinutes = async (minutes: number): Promise<string> => toLocal(new Date((await serverNow()).getTime() + minutes * minute), place).slice(0, 16);

const app = () => openDatabase(process.env.DATABASE_URL ?? '', 'fullfield_app', { max: 2, name: 'browser tests' });

async function accountOf(name: string): Promise<string> {
  return (await database().selectFrom('account').select('id').where('email', '=', addressOf(name)).executeTakeFirstOrThrow()).id;
}

async function as(db: ReturnType<typeof app>, key: StaffKey): Promise<Context> {
  const { name, roles } = staff[key];
  return { db, actor: { kind: 'account', id: await accountOf(name), name, roles: new Set<Role>(roles) } };
}

export type Prepared = { sittingId: string; candidates: Map<string, string> };

/** A sitting of the demo's form for one of its classes, with check-in open and these people admitted, or running; by the real commands. */
export async function prepareSitting(options: { className: string; title: string; admitted: readonly string[]; running?: boolean }): Promise<Prepared> {
  const db = app();
  try {
    const [author, proctor] = [await as(db, 'author'), await as(db, 'proctor')];
    const form = await db.selectFrom('form').select(['id']).where('title', '=', 'Direct-current machines, period 2').orderBy('number').executeTakeFirstOrThrow();
    const cls = await db.selectFrom('class').select('id').where('name', '=', options.className).executeTakeFirstOrThrow();
    const { sittingId } = valueOf(await planSitting(author, {
      formId: form.id, classId: cls.id, title: options.title, room: '114', proctors: [await accountOf(staff.proctor.name)],
      opensAt: await inMinutes(-5), startsAt: await inMinutes(0), latestStartAt: await inMinutes(600),
    }));
    valueOf(await drawPapers(db, { sittingId }));
    valueOf(await openCheckIn(proctor, sittingId));
    const rows = await db.selectFrom('candidate').innerJoin('account', 'account.id', 'candidate.account_id').select(['candidate.id', 'account.name']).where('sitting_id', '=', sittingId).execute();
    const candidates = new Map(rows.map((row) => [row.name, row.id]));
    valueOf(await admit(proctor, sittingId, options.admitted.map((name) => candidates.get(name) ?? '')));
    if (options.running) valueOf(await startSitting(proctor, sittingId));
    return { sittingId, candidates };
  } finally {
    await db.destroy();
  }
}

async function byProctor(work: (proctor: Context) => Promise<Result<unknown>>): Promise<void> {
  const db = app();
  try {
    valueOf(await work(await as(db, 'proctor')));
  } finally {
    await db.destroy();
  }
}

/** The proctor starts a prepared sitting. */
export const startByProctor = (sittingId: string): Promise<void> => byProctor((proctor) => startSitting(proctor, sittingId));

/** The proctor closes a sitting that runs, so that it stands on nobody's Today any more. */
export const closeByProctor = (sittingId: string): Promise<void> => byProctor((proctor) => closeSitting(proctor, sittingId));

/** What the server alone knows of a candidate's paper: the draw of each question, keys and missteps in it. */
export async function drawsOf(candidateId: string): Promise<Draw[]> {
  const rows = await database().selectFrom('paper_key').select('draw').where('candidate_id', '=', candidateId).orderBy('question').execute();
  return rows.map((row) => row.draw as unknown as Draw);
}

/** The answer that counts of each part on the server, by `question/part`. */
export async function storedAnswers(candidateId: string): Promise<Map<string, string>> {
  const rows = await database().selectFrom('response').select(['question', 'part', 'answer']).where('candidate_id', '=', candidateId).orderBy('sequence').execute();
  return new Map(rows.map((row) => [`${row.question}/${row.part}`, row.answer]));
}
