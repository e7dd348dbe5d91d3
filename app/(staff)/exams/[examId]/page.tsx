import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { ExamEditor } from '@/components/exams/ExamEditor';
import { FormList } from '@/components/exams/FormList';
import { QueryProvider } from '@/components/shell/QueryProvider';
import { PageHead } from '@/components/ui/PageHead';
import { StateMark } from '@/components/ui/StateMark';
import { pageContext } from '@/lib/auth/context';
import { areaTitles } from '@/lib/bank/areas';
import { choosableVersions, examPage } from '@/lib/exams/queries';
import { readSchool } from '@/lib/school/queries';
import { showDate, showMoment } from '@/lib/school/times';
import { approveExamAction, askForReviewAction, retireExamAction, returnExamAction, saveExamAction } from '../actions';

type Props = { params: Promise<{ examId: string }> };

const load = cache(async (examId: string) => {
  const context = await pageContext('instructor');
  const exam = await examPage(context, examId);
  if (!exam.ok) notFound();
  return { context, exam: exam.value };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: (await load((await params).examId)).exam.title };
}

const review = { ask: askForReviewAction, giveBack: returnExamAction, approve: approveExamAction, retire: retireExamAction };

export default async function ExamPage({ params }: Props) {
  const { context, exam } = await load((await params).examId);
  const choosable = await choosableVersions(context);
  const { settings } = await readSchool(context.db);
  const { forms, versions, owner, changedBy, changedAt, ...sheet } = exam;
  const known = new Set(versions.map((version) => version.versionId));
  const all = [...versions, ...(choosable.ok ? choosable.value : []).filter((version) => !known.has(version.versionId))];
  const says = <><StateMark thing="exam" state={exam.state} /> · begun by {owner} · changed {showMoment(changedAt, settings)} by {changedBy}</>;
  return (
    <QueryProvider>
      <PageHead title={exam.title} says={says} back={{ href: '/exams', label: 'Exams' }} />
      <ExamEditor key={exam.state} exam={sheet} versions={all} areas={areaTitles()} save={saveExamAction} review={review}>
        <FormList forms={forms.map((form) => ({ ...form, approved: showDate(form.approvedAt, settings) }))} />
      </ExamEditor>
    </QueryProvider>
  );
}
