import type { Metadata } from 'next';
import { OwnResults } from '@/components/results/OwnResults';
import { pageContext } from '@/lib/auth/context';
import { ownResults } from '@/lib/results/paper-queries';
import { showMarks, showOf } from '@/lib/results/show';
import { readSchool } from '@/lib/school/queries';
import { showDate } from '@/lib/school/times';

export const metadata: Metadata = { title: 'My results' };

export default async function ResultsPage() {
  const context = await pageContext('student');
  const [results, { settings }] = await Promise.all([ownResults(context), readSchool(context.db)]);
  const lines = results.map((result) => ({
    ...result, sat: showDate(result.startsAt, settings),
    says: result.total === null || result.of === null || result.outcome === 'absent' ? '' : `${showMarks(result.total, settings)} of ${showOf(result.of, settings)}`,
  }));
  return <OwnResults results={lines} />;
}
