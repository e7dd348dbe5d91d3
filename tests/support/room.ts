import { randomUUID } from 'node:crypto';
import { sql } from 'kysely';
import type { Database } from '@/db/client';
import type { Context, Role } from '@/lib/context';

export type RoomFixture = {
  sittingId: string;
  proctor: Context;
  instructor: Context;
  candidates: { id: string; accountId: string; context: Context }[];
};

/** An account with roles, and the context in which it acts through `db`. */
export async function makeAccount(owner: Database, db: Database, name: string, ...roles: Role[]): Promise<Context & { id: string }> {
  const id = randomUUID();
  await owner.insertInto('account').values({ id, name, sort_name: name, email: `${id}@example.test`, state: 'active' }).execute();
  if (roles.length > 0) await owner.insertInto('account_role').values(roles.map((role) => ({ account_id: id, role }))).execute();
  return { id, db, actor: { kind: 'account', id, name, roles: new Set(roles) } };
}

const question = { marks: 2, minutes: 3, conventions: [], cautions: [], plate: [], stemHtml: '<p>Stem</p>', parts: [{ part: 'a' }, { part: 'b' }] };

/** A sitting of two questions with two parts each, for `count` candidates; by rows, for tests of what comes after planning. */
export async function makeRoom(owner: Database, db: Database, count: number, state = 'check-in'): Promise<RoomFixture> {
  const instructor = await makeAccount(owner, db, 'Ines Instructor', 'instructor');
  const proctor = await makeAccount(owner, db, 'Piet Proctor', 'proctor');
  const term = await owner.insertInto('term').values({ name: `Term ${randomUUID()}`, starts_on: '2026-01-01', ends_on: '2026-12-31' }).returning('id').executeTakeFirstOrThrow();
  const cls = await owner.insertInto('class').values({ term_id: term.id, name: 'E2-A' }).returning('id').executeTakeFirstOrThrow();
  const exam = await owner.insertInto('exam').values({ title: 'Machines', state: 'approved', content: '{}', owner_id: instructor.id, changed_by: instructor.id }).returning('id').executeTakeFirstOrThrow();
  const form = await owner.insertInto('form').values({ exam_id: exam.id, number: 1, title: 'Machines', content: '{}', marks: 4, minutes: 120, approved_by: instructor.id, digest: 'd' }).returning('id').executeTakeFirstOrThrow();
  const sitting = await owner.insertInto('sitting').values({
    form_id: form.id, class_id: cls.id, title: 'Machines', room: '114', state, opens_at: sql<Date>`app.now()`, starts_at: sql<Date>`app.now()`,
    latest_start_at: sql<Date>`app.now() + interval '1 hour'`, minutes: 120, locale: 'en-CA', secret: Buffer.alloc(32, 7), papers: 'drawn', created_by: instructor.id,
  }).returning('id').executeTakeFirstOrThrow();
  await owner.insertInto('sitting_proctor').values({ sitting_id: sitting.id, account_id: proctor.id }).execute();
  const candidates: RoomFixture['candidates'] = [];
  for (let place = 0; place < count; place += 1) {
    const student = await makeAccount(owner, db, `Student ${place}`, 'student');
    const candidate = await owner.insertInto('candidate').values({ sitting_id: sitting.id, account_id: student.id, seat: `A${place + 1}`, seconds_allowed: 7200 }).returning('id').executeTakeFirstOrThrow();
    await owner.insertInto('paper').values({ candidate_id: candidate.id, form_id: form.id, engine: '1', locale: 'en-CA', questions: 2, parts: 4, content: JSON.stringify({ questions: [question, question] }), digest: 'd' }).execute();
    candidates.push({ id: candidate.id, accountId: student.id, context: student });
  }
  return { sittingId: sitting.id, proctor, instructor, candidates };
}
