import { randomInt } from 'node:crypto';
import { type Kysely, sql } from 'kysely';
import type { DB } from '@/db/types';
import { chainHead } from '@/lib/audit/queries';
import { roundingSentence } from '@/lib/results/sentences';
import { showMarks, showOf } from '@/lib/results/show';
import { type ResultRow, totalsIn } from '@/lib/results/store';
import type { Share } from '@/lib/results/model';
import type { School } from '@/lib/school/model';
import { showDate, showTime, zoneName } from '@/lib/school/times';
import { attemptSays, codeAlphabet, type ReportContent } from './model';

/** A code to check a report by: twelve signs in fours, by chance. */
function newCode(): string {
  const signs = Array.from({ length: 12 }, () => codeAlphabet[randomInt(codeAlphabet.length)]).join('');
  return `${signs.slice(0, 4)}-${signs.slice(4, 8)}-${signs.slice(8)}`;
}

const identity = (db: Kysely<DB>, candidateId: string) =>
  db
    .selectFrom('candidate as c').innerJoin('account as a', 'a.id', 'c.account_id').innerJoin('sitting as s', 's.id', 'c.sitting_id')
    .innerJoin('class as k', 'k.id', 's.class_id').innerJoin('form as f', 'f.id', 's.form_id')
    .where('c.id', '=', candidateId)
    .select((of) => [
      'a.name', 'a.learner_number', 'k.name as class_name', 's.title', 's.starts_at', 'f.title as exam', 'f.number as form',
      of
        .selectFrom('candidate as e').innerJoin('sitting as t', 't.id', 'e.sitting_id').innerJoin('form as g', 'g.id', 't.form_id')
        .whereRef('e.account_id', '=', 'c.account_id').whereRef('g.exam_id', '=', 'f.exam_id').whereRef('t.starts_at', '<', 's.starts_at')
        .where('e.started_at', 'is not', null).select(sql<number>`count(*)::int`.as('n')).as('earlier'),
    ])
    .executeTakeFirstOrThrow();

type Making = { result: ResultRow; before: { issue: number; at: Date } | undefined; school: School; by: string; now: Date };

/** Everything a report says, as texts. `result` is a sealed one. */
export async function buildReport(db: Kysely<DB>, making: Making): Promise<ReportContent> {
  const { result, before, school, now } = making;
  const who = await identity(db, result.candidate_id);
  const sealer = result.made_by === null ? undefined : await db.selectFrom('account').select('name').where('id', '=', result.made_by).executeTakeFirst();
  const totals = totalsIn(result);
  const place = school.settings;
  const marks = (value: number) => showMarks(value, place);
  const of = (value: number) => showOf(value, place);
  const share = (title: string, { awarded, of: whole, percent }: Share) => ({ title, awarded: marks(awarded), of: of(whole), percent: marks(percent) });
  const moment = (time: Date) => `${showDate(time, place)}, ${showTime(time, place)} ${zoneName(time, place)}`;
  const absent = totals.outcome === 'absent';
  if (totals.outcome === 'second marker') throw new Error('A sealed result waits for a marker.');
  const overall = totals.rule.rules[0];
  return {
    document: 'grade report', version: 1,
    school: { name: school.name, office: place.office, address: place.helpAddress },
    candidate: { name: who.name, learnerNumber: who.learner_number ?? '' },
    className: who.class_name, exam: who.exam, form: `form ${who.form}`, sitting: who.title, sat: showDate(who.starts_at, place), attempt: attemptSays((who.earlier ?? 0) + 1),
    outcome: totals.outcome, total: absent ? '–' : marks(totals.total), of: of(totals.of), percent: absent ? '–' : marks(totals.percent), passAt: of(overall?.wanted ?? 0),
    sections: absent ? [] : totals.breakdown.sections.map((section) => ({ ...share(section.title, section), areas: section.areas.map((area) => share(area.title, area)) })),
    rules: absent ? [] : totals.rule.rules.map((rule) => ({ says: `${rule.says}: ${of(rule.wanted)} % or more`, had: `${marks(rule.had)} %`, met: rule.met })),
    sentence: absent ? '' : roundingSentence[totals.rule.rounding],
    sealed: `${moment(result.at)}${sealer ? `, by ${sealer.name}, registrar` : ''}`,
    issued: { at: now.toISOString(), says: `${moment(now)}, by ${making.by}, registrar` },
    issue: (before?.issue ?? 0) + 1,
    supersedes: before ? `issue ${before.issue} of ${moment(before.at)}` : 'none',
    log: await chainHead(db).then((top) => top && { block: top.number, digest: top.digest }),
    code: newCode(),
  };
}
