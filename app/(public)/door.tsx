import Link from 'next/link';
import type { ReactNode } from 'react';
import { Door } from '@/components/auth/Door';
import { appDb } from '@/db/client';
import { readClock } from '@/db/clock';
import { readTermOn } from '@/lib/classes/queries';
import { config } from '@/lib/config';
import type { School } from '@/lib/school/model';
import { readSchool } from '@/lib/school/queries';
import { localDay, showTime, zoneName } from '@/lib/school/times';

/** What the plate at the door says: only what the school has told. */
async function factsOf(school: School) {
  const db = appDb();
  const now = await readClock(db);
  const { settings } = school;
  const told = [
    { label: 'Term', value: await readTermOn(db, localDay(now, settings)) },
    { label: 'Exam office', value: settings.office },
    { label: 'Help', value: settings.helpAddress },
    { label: 'Time on the server', value: `${showTime(now, settings)}, ${zoneName(now, settings)}` },
  ];
  return told.flatMap(({ label, value }) => (value ? [{ label, value }] : []));
}

/** The school's half of the way in, round one thing to do. */
export async function SchoolDoor({ children }: { children: ReactNode }) {
  const school = await readSchool(appDb());
  const links = (
    <>
      <Link href="/rehearse">Rehearse on a dummy paper</Link>
      {config().kind !== 'school' && <Link href="/mail">Read the mail of this demo</Link>}
    </>
  );
  return (
    <Door school={school.name} facts={await factsOf(school)} links={links}>
      {children}
    </Door>
  );
}
