import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ClassesLedger } from '@/components/people/ClassesLedger';
import { ClassForm } from '@/components/people/ClassForm';
import { PeopleTabs } from '@/components/people/PeopleTabs';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { listClasses, listInstructors, listTerms } from '@/lib/classes/queries';
import { storeClass } from './actions';

export const metadata: Metadata = { title: 'Classes' };

export default async function ClassesPage() {
  const context = await pageContext('registrar');
  const [classes, terms, instructors] = await Promise.all([listClasses(context), listTerms(context), listInstructors(context)]);
  if (!classes.ok || !terms.ok || !instructors.ok) notFound();
  const open = terms.value.filter((term) => term.state === 'open');
  const first = open[0];
  return (
    <>
      <PageHead title="Classes" says="Who learns together, and who teaches them. A sitting is scheduled for a class.">
        {first ? (
          <ClassForm
            look="main"
            label="New class"
            title="New class"
            fields={{ values: { termId: first.id, name: '', title: '', instructorIds: [] }, terms: open, instructors: instructors.value, save: storeClass.bind(null, null) }}
          />
        ) : (
          <LinkButton look="main" href="/people/terms">
            Make a term first
          </LinkButton>
        )}
      </PageHead>
      <PeopleTabs />
      <ClassesLedger classes={classes.value} />
    </>
  );
}
