import { issueReports, sendReports } from '@/lib/reports/commands';
import { moderateSitting, overrideMark, releaseResults, sealResults } from '@/lib/results/commands';
import { markSitting } from '@/lib/results/marking';
import type { Company } from './people';
import { must, type Stage } from './stage';

/** Of the marks that lost something to a misstep, one that a marker looks at again. */
async function oneToLookAt({ db }: Stage, sittingId: string) {
  return db
    .selectFrom('mark')
    .innerJoin('candidate', 'candidate.id', 'mark.candidate_id')
    .select(['mark.candidate_id', 'mark.question', 'mark.part', 'mark.issue', 'mark.of', 'mark.awarded'])
    .where('candidate.sitting_id', '=', sittingId)
    .where('mark.verdict', '=', 'wrong')
    .where('mark.of', '>=', 2)
    .orderBy('mark.candidate_id').orderBy('mark.question').orderBy('mark.part')
    .limit(1)
    .executeTakeFirst();
}

/** Marks the sitting that is over; the instructor corrects one mark, moderates and releases; the registrar seals. */
export async function publish(stage: Stage, company: Company, sittingId: string): Promise<void> {
  await markSitting(stage.db, sittingId);
  const mark = await oneToLookAt(stage, sittingId);
  if (mark) {
    must(await overrideMark(company.author, {
      candidateId: mark.candidate_id, question: mark.question, part: mark.part, issue: mark.issue, awarded: 1, reason: 'Method right on the working sheet, figure copied wrongly.',
    }), 'an override');
  }
  must(await moderateSitting(company.author, sittingId), 'moderating');
  must(await releaseResults(company.author, sittingId), 'releasing');
  must(await sealResults(company.registrar, sittingId), 'sealing');
  const candidates = await stage.db.selectFrom('candidate').select('id').where('sitting_id', '=', sittingId).where('state', 'in', ['handed in', 'timed out']).orderBy('seat').limit(6).execute();
  const candidateIds = candidates.map((candidate) => candidate.id);
  must(await issueReports(company.registrar, { sittingId, candidateIds }), 'issuing grade reports');
  must(await sendReports(company.registrar, { sittingId, candidateIds: candidateIds.slice(0, 3) }), 'sending grade reports');
  stage.say('  marked, released and sealed; six grade reports issued');
}
