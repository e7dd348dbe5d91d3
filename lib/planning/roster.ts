import { sql } from 'kysely';
import type { Context } from '@/lib/context';
import type { Allowance } from './model';
import { mostOf } from './rules';

export type Enrolled = { accountId: string; name: string; learnerNumber: string | null };

/** Students enrolled in a class on a day ("2026-12-08", in the school's zone) whose accounts are open, by name. */
export async function enrolledOn(context: Pick<Context, 'db'>, classId: string, day: string): Promise<Enrolled[]> {
  const rows = await context.db
    .selectFrom('enrolment as e')
    .innerJoin('account as a', 'a.id', 'e.account_id')
    .where('e.class_id', '=', classId)
    .where('a.state', '<>', 'closed')
    .where('e.since', '<=', day)
    .where((eb) => eb.or([eb('e.until', 'is', null), eb('e.until', '>=', day)]))
    .select(['a.id', 'a.name', 'a.learner_number'])
    .orderBy('a.sort_name')
    .orderBy('a.id')
    .execute();
  return rows.map((row) => ({ accountId: row.id, name: row.name, learnerNumber: row.learner_number }));
}

/** What the accommodations of these students give on a day; students without any are left out. Never the reason. */
export async function allowancesOn(context: Pick<Context, 'db'>, accountIds: readonly string[], day: string): Promise<Map<string, Allowance>> {
  if (accountIds.length === 0) return new Map();
  const rows = await context.db
    .selectFrom('accommodation')
    .where('account_id', 'in', [...accountIds])
    .where('ended_at', 'is', null)
    .where('since', '<=', day)
    .where((eb) => eb.or([eb('until', 'is', null), eb('until', '>=', day)]))
    .select(['account_id', sql<number>`extra_percent::float8`.as('extra_percent'), 'extra_minutes', 'rest_minutes', 'large_print', 'separate_room'])
    .execute();
  const of = new Map<string, Allowance[]>();
  for (const row of rows) {
    const allowance = {
      extraPercent: row.extra_percent, extraMinutes: row.extra_minutes, restMinutes: row.rest_minutes,
      largePrint: row.large_print, separateRoom: row.separate_room,
    };
    of.set(row.account_id, [...(of.get(row.account_id) ?? []), allowance]);
  }
  return new Map([...of].map(([id, allowances]) => [id, mostOf(allowances)]));
}
