import type { Metadata } from 'next';
import { TodaySheet } from '@/components/candidates/TodaySheet';
import { pageContext } from '@/lib/auth/context';
import { readToday } from '@/lib/candidates/today-queries';
import { readSchool } from '@/lib/school/queries';

export const metadata: Metadata = { title: 'Today' };

/** What this student sits next. */
export default async function TodayPage() {
  const context = await pageContext('student');
  const [today, school] = await Promise.all([readToday(context), readSchool(context.db)]);
  return <TodaySheet {...today} place={school.settings} />;
}
