import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PeopleLedger } from '@/components/people/PeopleLedger';
import { PeopleTabs } from '@/components/people/PeopleTabs';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { listPeople } from '@/lib/people/queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';

export const metadata: Metadata = { title: 'People' };

export default async function PeoplePage() {
  const context = await pageContext('registrar');
  const [people, { settings }] = await Promise.all([listPeople(context), readSchool(context.db)]);
  if (!people.ok) notFound();
  const lines = people.value.map(({ lastSignIn, ...person }) => ({
    ...person,
    lastSignIn: lastSignIn && { at: lastSignIn.toISOString(), says: showMoment(lastSignIn, settings) },
  }));
  return (
    <>
      <PageHead title="People" says="Everybody with an account: who they are, what they may do, and which classes they belong to.">
        <LinkButton href="/people/import">Import a roster</LinkButton>
        <LinkButton href="/people/new" look="main">
          New person
        </LinkButton>
      </PageHead>
      <PeopleTabs />
      <PeopleLedger people={lines} />
    </>
  );
}
