import type { Metadata } from 'next';
import { SchoolForm } from '@/components/school/SchoolForm';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { readSchool } from '@/lib/school/queries';
import { storeSchool } from './actions';

export const metadata: Metadata = { title: 'School settings' };

export default async function SchoolPage() {
  const context = await pageContext('registrar');
  const { name, version, settings } = await readSchool(context.db);
  const zones = ['UTC', ...Intl.supportedValuesOf('timeZone').filter((zone) => zone !== 'UTC')];
  return (
    <>
      <PageHead title="School settings" says="What the school decides once; exams, papers and reports follow it." />
      <SchoolForm values={{ name, version, ...settings }} zones={zones} save={storeSchool} />
    </>
  );
}
