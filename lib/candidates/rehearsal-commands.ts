import { sql } from 'kysely';
import { record } from '@/lib/audit/commands';
import { accountId, type Context, inTransaction } from '@/lib/context';

/** Notes for every sitting ahead that this student has gone through the rehearsal. */
export async function noteRehearsal(context: Context): Promise<number> {
  const self = accountId(context.actor);
  if (!self) return 0;
  return inTransaction(context, async (locked) => {
    const noted = await locked.db
      .updateTable('candidate')
      .set({ rehearsed_at: sql`app.now()` })
      .where('account_id', '=', self)
      .where('state', 'in', ['expected', 'admitted'])
      .returning('id')
      .execute();
    await record(locked, { kind: 'candidate.rehearsed', subject: 'account', subjectId: self, data: { sittings: noted.length } });
    return noted.length;
  });
}
