import { sql } from 'kysely';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { readClock } from '@/db/clock';
import { migrateToLatest, pendingMigrations } from '@/db/migrate';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';

let database: TestDatabase;
beforeAll(async () => void (database = await openTestDatabase()));
afterAll(() => database.close());

describe('migrations', () => {
  it('leave nothing pending, and applying them again changes nothing', async () => {
    expect(await pendingMigrations(database.owner)).toEqual([]);
    expect(await migrateToLatest(database.owner)).toEqual([]);
  });

  it('keep keys and account secrets from the role of a candidate', async () => {
    await expect(sql`select * from paper_key`.execute(database.candidate)).rejects.toThrow(/permission denied/);
    await expect(sql`select password_hash from account`.execute(database.candidate)).rejects.toThrow(/permission denied/);
    await expect(sql`select secret from sitting`.execute(database.candidate)).rejects.toThrow(/permission denied/);
  });

  it('give both roles the clock, which is shifted for a test only', async () => {
    await database.setClock(new Date('2026-03-02T08:00:00Z'));
    for (const db of [database.app, database.candidate]) {
      const off = Math.abs((await readClock(db)).getTime() - Date.parse('2026-03-02T08:00:00Z'));
      expect(off).toBeLessThan(5_000);
    }
    await expect(sql`update app.installation set kind = 'school'`.execute(database.owner)).rejects.toThrow(/shift_only_outside_a_school/);
  });
});

describe('values', () => {
  it('arrive as numbers and days, and a number that would not be exact is refused', async () => {
    const { rows } = await sql<{ big: number; mark: number; day: string }>`
      select 9007199254740991::int8 as big, 2.50::numeric as mark, '2026-03-02'::date as day`.execute(database.app);
    expect(rows[0]).toEqual({ big: 9007199254740991, mark: 2.5, day: '2026-03-02' });
    await expect(sql`select 9007199254740993::int8`.execute(database.app)).rejects.toThrow(RangeError);
  });
});
