import type { Metadata } from 'next';
import { NewPersonForm } from '@/components/people/NewPersonForm';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { addPerson } from '../actions';

export const metadata: Metadata = { title: 'New person' };

export default async function NewPersonPage() {
  await pageContext('registrar');
  return (
    <>
      <PageHead title="New person" says="One account for one person, whatever roles they hold." back={{ href: '/people', label: 'People' }} />
      <NewPersonForm add={addPerson} />
    </>
  );
}
