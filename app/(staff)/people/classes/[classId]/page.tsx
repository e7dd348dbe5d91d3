import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ClassForm } from '@/components/people/ClassForm';
import { EnrolForm } from '@/components/people/EnrolForm';
import { MembersLedger } from '@/components/people/MembersLedger';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { listInstructors, listTerms, readClass } from '@/lib/classes/queries';
import { readSchool } from '@/lib/school/queries';
import { enrolIn, slipsFor, storeClass, takeOutOf } from '../actions';

type Props = { params: Promise<{ classId: string }> };

async function load({ params }: Props) {
  const { classId } = await params;
  const context = await pageContext('registrar');
  const read = await readClass(context, classId);
  return read.ok ? { context, ...read.value } : notFound();
}

export async function generateMetadata(props: Props): Promise<Metadata> {
  return { title: `Class ${(await load(props)).row.name}` };
}

export default async function ClassPage(props: Props) {
  const { context, row, instructorIds, members, others } = await load(props);
  const [terms, instructors, school] = await Promise.all([listTerms(context), listInstructors(context), readSchool(context.db)]);
  if (!terms.ok || !instructors.ok) notFound();
  const choices = terms.value.filter((term) => term.state === 'open' || term.id === row.termId);
  const says = [row.title, row.term, row.instructors.length > 0 ? `taught by ${row.instructors.join(', ')}` : 'without an instructor'].filter(Boolean).join('; ');
  const values = { termId: row.termId, name: row.name, title: row.title, instructorIds };
  return (
    <>
      <div className="print:hidden">
        <PageHead title={`Class ${row.name}`} says={says} back={{ href: '/people/classes', label: 'Classes' }}>
          <ClassForm label="Change the class" title={`Class ${row.name}`} fields={{ values, terms: choices, instructors: instructors.value, save: storeClass.bind(null, row.id) }} />
        </PageHead>
      </div>
      <MembersLedger school={school.name} className={row.name} members={members} makeSlips={slipsFor} takeOut={takeOutOf.bind(null, row.id)} />
      <section aria-labelledby="enrol" className="mt-12 grid gap-4 print:hidden">
        <h2 id="enrol" className="text-22">Enrol students</h2>
        <EnrolForm className={row.name} students={others} enrol={enrolIn.bind(null, row.id)} />
      </section>
    </>
  );
}
