import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { AccommodationForm } from '@/components/people/AccommodationForm';
import { AccommodationList } from '@/components/people/AccommodationList';
import { AccountActions } from '@/components/people/AccountActions';
import { ParticularsForm } from '@/components/people/ParticularsForm';
import { PersonClasses } from '@/components/people/PersonClasses';
import { RolesForm } from '@/components/people/RolesForm';
import { PageHead } from '@/components/ui/PageHead';
import { StateMark } from '@/components/ui/StateMark';
import { Timeline } from '@/components/ui/Timeline';
import { listAccommodations } from '@/lib/accommodations/queries';
import { pageContext } from '@/lib/auth/context';
import { readPerson } from '@/lib/people/queries';
import { eventInWords } from '@/lib/people/words';
import { showDay } from '@/lib/school/days';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';
import { today } from '@/lib/school/today';
import { closePerson, end, give, reopenPerson, saveParticulars, saveRoles, sendLinkTo } from '../actions';

type Props = { params: Promise<{ accountId: string }> };

async function load({ params }: Props) {
  const { accountId } = await params;
  const context = await pageContext('registrar');
  const read = await readPerson(context, accountId);
  return read.ok ? { context, ...read.value } : notFound();
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: (await load(props)).person.name };
}

export default async function PersonPage(props: Props) {
  const { context, person, classes, openLink, events } = await load(props);
  const [accommodations, { settings }, day] = await Promise.all([listAccommodations(context, person.id), readSchool(context.db), today(context.db)]);
  if (!accommodations.ok) notFound();
  const date = (text: string) => showDay(text, settings);
  const entries = events.map((event) => ({
    key: String(event.id),
    at: showMoment(event.at, settings),
    machine: event.at.toISOString(),
    says: `${eventInWords(event.kind)}${event.note ? ` (${event.note})` : ''}${event.actor ? `, by ${event.actor}` : ''}`,
  }));
  const { id, name } = person;
  const link = openLink && `${openLink.purpose === 'invitation' ? 'An invitation' : 'A link for a new password'} is open until ${showMoment(openLink.expiresAt, settings)}.`;
  return (
    <>
      <PageHead title={name} says={<StateMark thing="account" state={person.state} />} back={{ href: '/people', label: 'People' }} />
      <div className="grid items-start gap-x-12 gap-y-10 lg:grid-cols-2">
        <section aria-labelledby="particulars" className="grid gap-5">
          <h2 id="particulars" className="text-22">Particulars</h2>
          <ParticularsForm
            key={`${person.name} ${person.email} ${person.learnerNumber} ${person.sortName}`}
            values={{ name, sortName: person.sortName, email: person.email ?? '', learnerNumber: person.learnerNumber ?? '' }}
            save={saveParticulars.bind(null, id)}
          />
        </section>
        <section aria-labelledby="access" className="grid gap-5">
          <h2 id="access" className="text-22">Access</h2>
          <RolesForm key={person.roles.join()} name={name} held={person.roles} save={saveRoles.bind(null, id)} />
          {link && <p className="text-15 text-ink-soft">{link}</p>}
          <AccountActions name={name} state={person.state} hasEmail={person.email !== null} sendLink={sendLinkTo.bind(null, id)} close={closePerson.bind(null, id)} reopen={reopenPerson.bind(null, id)} />
        </section>
        <section aria-labelledby="accommodations" className="grid gap-4">
          <h2 id="accommodations" className="text-22">Accommodations</h2>
          <AccommodationList rows={accommodations.value} today={day} date={date} end={end} />
          <div className="btn-row">
            <AccommodationForm today={day} give={give.bind(null, id)} />
          </div>
        </section>
        <section aria-labelledby="classes" className="grid gap-4">
          <h2 id="classes" className="text-22">Classes</h2>
          <PersonClasses classes={classes} date={date} />
        </section>
        <section aria-labelledby="history" className="grid gap-4 lg:col-span-2">
          <h2 id="history" className="text-22">What was done</h2>
          <Timeline entries={entries} />
        </section>
      </div>
    </>
  );
}
