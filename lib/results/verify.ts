import type { Kysely } from 'kysely';
import type { DB } from '@/db/types';
import { digestOfRow, markName, reportName, resultName } from './store';

/** `candidate` is an id; `row` names the row as the log does: `mark 3 b 2` is question 3, part b, issue 2. */
export type RowFault = { candidate: string; row: string; says: string };

const logKinds = ['marks.awarded', 'report.issued'];

/** What the log binds: digests by candidate and name of the row. */
async function boundRows(db: Kysely<DB>): Promise<Map<string, string>> {
  const events = await db
    .selectFrom('event').select(['subject_id', 'data']).where('subject', '=', 'candidate')
    .where((of) => of.or([of('kind', 'in', logKinds), of('kind', 'like', 'result.%')])).orderBy('id').execute();
  const bound = new Map<string, string>();
  for (const event of events) {
    const { rows } = event.data as { rows?: string[] };
    for (const row of rows ?? []) {
      const at = row.lastIndexOf(' ');
      bound.set(`${event.subject_id} ${row.slice(0, at)}`, row.slice(at + 1));
    }
  }
  return bound;
}

/** Rows of one table with their names, read in portions so that reports with their files never stand in memory together. */
async function* storedRows(db: Kysely<DB>): AsyncGenerator<{ candidate: string; row: string; digest: string }> {
  for (const { id: candidate } of await db.selectFrom('candidate').select('id').orderBy('id').execute()) {
    for (const row of await db.selectFrom('mark').selectAll().where('candidate_id', '=', candidate).execute()) yield { candidate, row: markName(row), digest: digestOfRow(row) };
    for (const row of await db.selectFrom('result').selectAll().where('candidate_id', '=', candidate).execute()) yield { candidate, row: resultName(row), digest: digestOfRow(row) };
    for (const row of await db.selectFrom('report').selectAll().where('candidate_id', '=', candidate).execute()) yield { candidate, row: reportName(row), digest: digestOfRow(row) };
  }
}

/** Compares every mark, result and report with the digest that the log holds of it, and names each that was changed, added or taken away. */
export async function verifyRows(db: Kysely<DB>): Promise<RowFault[]> {
  const bound = await boundRows(db);
  const faults: RowFault[] = [];
  for await (const { candidate, row, digest } of storedRows(db)) {
    const name = `${candidate} ${row}`;
    const logged = bound.get(name);
    bound.delete(name);
    if (logged === undefined) faults.push({ candidate, row, says: `The ${row} of candidate ${candidate} is in no event of the log.` });
    else if (logged !== digest) faults.push({ candidate, row, says: `The ${row} of candidate ${candidate} is not as it was written.` });
  }
  for (const name of bound.keys()) {
    const [candidate = '', ...row] = name.split(' ');
    faults.push({ candidate, row: row.join(' '), says: `The ${row.join(' ')} of candidate ${candidate} is gone.` });
  }
  return faults;
}
