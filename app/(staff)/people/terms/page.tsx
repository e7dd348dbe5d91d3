import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { PeopleTabs } from '@/components/people/PeopleTabs';
import { TermForm } from '@/components/people/TermForm';
import { TermsLedger } from '@/components/people/TermsLedger';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { listTerms } from '@/lib/classes/queries';
import { showDay } from '@/lib/school/days';
import { readSchool } from '@/lib/school/queries';
import { moveTerm, storeTerm } from '../classes/actions';

export const metadata: Metadata = { title: 'Terms' };

export default async function TermsPage() {
  const context = await pageContext('registrar');
  const [terms, { settings }] = await Promise.all([listTerms(context), readSchool(context.db)]);
  if (!terms.ok) notFound();
  return (
    <>
      <PageHead title="Terms" says="The times that classes belong to. The one that today falls into stands at the door.">
        <TermForm look="main" label="New term" title="New term" values={{ name: '', startsOn: '', endsOn: '' }} save={storeTerm.bind(null, null)} />
      </PageHead>
      <PeopleTabs />
      <TermsLedger terms={terms.value} date={(day) => showDay(day, settings)} save={storeTerm} setState={moveTerm} />
    </>
  );
}
