import type { Metadata } from 'next';
import { readClock } from '@/db/clock';
import { Rehearsal } from '@/components/candidates/Rehearsal';
import { pageContext } from '@/lib/auth/context';
import { readSchool } from '@/lib/school/queries';
import { zoneOffset } from '@/lib/school/times';
import { finishRehearsal } from './actions';

export const metadata: Metadata = { title: 'Rehearsal' };

/** The exam room on a dummy paper, for getting to know it and for trying a device. */
export default async function RehearsePage() {
  const context = await pageContext('student');
  const [now, school] = await Promise.all([readClock(context.db), readSchool(context.db)]);
  return <Rehearsal name={context.actor.name} now={now.getTime()} place={{ zoneOffset: zoneOffset(now, school.settings), locale: school.settings.locale }} done={finishRehearsal} />;
}
