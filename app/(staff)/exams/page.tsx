import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { ExamLedger } from '@/components/exams/ExamLedger';
import { NewExamForm } from '@/components/exams/NewExamForm';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { examLedger } from '@/lib/exams/queries';
import { readSchool } from '@/lib/school/queries';
import { showMoment } from '@/lib/school/times';
import { newExamAction } from './actions';

export const metadata: Metadata = { title: 'Exams' };

export default async function ExamsPage() {
  const context = await pageContext('instructor');
  const exams = await examLedger(context);
  if (!exams.ok) notFound();
  const { settings } = await readSchool(context.db);
  return (
    <>
      <PageHead title="Exams" says="What a class is examined with: questions chosen from the bank, time, pass rule and materials. Approval freezes an exam as a form that can be scheduled.">
        <NewExamForm make={newExamAction} />
      </PageHead>
      <ExamLedger exams={exams.value} moment={(time) => showMoment(time, settings)} />
    </>
  );
}
