import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { newSlipCode, slipDigest } from '@/lib/auth/tokens';
import { type Context, holds, inTransaction, type LockingContext } from '@/lib/context';
import { isId } from '@/lib/ids';
import { done, notFound, refuse, type Result } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { mayMakeSlips } from './policy';

/** What is printed. The code exists only here; the database keeps a digest. */
export type Slip = { accountId: string; name: string; learnerNumber: string; code: string; expiresAt: Date };
export type SlipsMade = { slips: Slip[]; left: { accountId: string; name: string; why: string }[] };

/** The students wanted that the actor may make slips for: all for a registrar, own candidates for a proctor. */
function studentsFor(context: LockingContext, accountIds: readonly string[], sittingId: string | null) {
  const { actor } = context;
  let query = context.db
    .selectFrom('account')
    .where('account.id', 'in', [...accountIds])
    .select(['account.id', 'name', 'learner_number', 'state'])
    .select(sql<boolean>`exists (select from account_role where account_id = account.id and role <> 'student')`.as('holds_more'))
    .orderBy('sort_name');
  if (!holds(actor, 'registrar'))
    query = query.where((where) =>
      where.exists(
        where
          .selectFrom('candidate')
          .innerJoin('sitting_proctor', 'sitting_proctor.sitting_id', 'candidate.sitting_id')
          .whereRef('candidate.account_id', '=', 'account.id')
          .where('candidate.sitting_id', '=', sittingId)
          .where('sitting_proctor.account_id', '=', actor.kind === 'account' ? actor.id : null)
          .select('candidate.id'),
      ),
    );
  return query;
}

/** A fresh code; a slip made before for the same person and not used ends. */
async function insertSlip(context: LockingContext, accountId: string, sittingId: string | null, hours: number): Promise<{ code: string; expiresAt: Date }> {
  await context.db
    .updateTable('slip')
    .set({ expires_at: sql`least(expires_at, app.now())` })
    .where('account_id', '=', accountId)
    .where('used_at', 'is', null)
    .execute();
  const code = newSlipCode();
  const row = await context.db
    .insertInto('slip')
    .values({ account_id: accountId, sitting_id: sittingId, code_hash: slipDigest(accountId, code), expires_at: sql`app.now() + make_interval(hours => ${hours})` })
    .returning(['id', 'expires_at'])
    .executeTakeFirstOrThrow();
  await record(context, { kind: 'slip.made', subject: 'account', subjectId: accountId, data: { slip: row.id } });
  return { code, expiresAt: row.expires_at };
}

/**
 * Makes one-time codes for students without e-mail. People who hold another role, have no learner number or are closed are left out,
 * with the reason: a paper code must open no staff account. Codes last as long as the school's setting says.
 */
export async function makeSlips(context: Context, accountIds: readonly string[], sittingId: string | null = null): Promise<Result<SlipsMade>> {
  if (!mayMakeSlips(context.actor) || !accountIds.every(isId) || (sittingId !== null && !isId(sittingId))) return notFound();
  if (accountIds.length === 0 || accountIds.length > 500) return refuse('invalid', 'Choose between 1 and 500 students.');
  return inTransaction(context, async (locked) => {
    const students = await studentsFor(locked, accountIds, sittingId).execute();
    if (students.length !== new Set(accountIds).size) return notFound();
    const { settings } = await readSchool(locked.db);
    const made: SlipsMade = { slips: [], left: [] };
    for (const student of students) {
      const why = student.state === 'closed' ? 'the account is closed' : student.holds_more ? 'holds another role than student' : student.learner_number === null ? 'has no learner number' : null;
      if (why !== null || student.learner_number === null) {
        made.left.push({ accountId: student.id, name: student.name, why: why ?? 'has no learner number' });
        continue;
      }
      const slip = await insertSlip(locked, student.id, sittingId, settings.slipHours);
      made.slips.push({ accountId: student.id, name: student.name, learnerNumber: student.learner_number, ...slip });
    }
    return done(made);
  });
}
