import type { Kysely } from 'kysely';
import { readClock } from '@/db/clock';
import type { DB } from '@/db/types';
import { readSchool } from './queries';
import { localDay } from './times';

/** The calendar day it is at the school now, "2026-12-01": enrolments and accommodations begin and end by it. */
export async function today(db: Kysely<DB>): Promise<string> {
  const [now, school] = await Promise.all([readClock(db), readSchool(db)]);
  return localDay(now, school.settings);
}
