import type { Database } from '@/db/client';
import { markPaper, markSitting } from './marking';

/** The job `mark-paper`: marks one ended paper. */
export async function markPaperJob(db: Database, { candidateId }: { candidateId: string }): Promise<void> {
  await markPaper(db, candidateId);
}

/** The job `mark-sitting`: marks what is not marked yet, and records who was absent. */
export async function markSittingJob(db: Database, { sittingId }: { sittingId: string }, signal: AbortSignal): Promise<void> {
  await markSitting(db, sittingId, signal);
}
