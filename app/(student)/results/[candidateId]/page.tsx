import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { OwnPaper } from '@/components/results/OwnPaper';
import { pageContext } from '@/lib/auth/context';
import { ownPaper } from '@/lib/results/paper-queries';
import { roundingSentence } from '@/lib/results/sentences';
import { showMarks, showOf } from '@/lib/results/show';
import { readSchool } from '@/lib/school/queries';
import { showDate } from '@/lib/school/times';

type Props = { params: Promise<{ candidateId: string }> };

const load = cache(async (candidateId: string) => {
  const context = await pageContext('student');
  const paper = await ownPaper(context, candidateId);
  if (!paper.ok) notFound();
  return { context, paper: paper.value };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  return { title: `Result, ${(await load((await params).candidateId)).paper.title}` };
}

export default async function ResultPage({ params }: Props) {
  const { context, paper } = await load((await params).candidateId);
  const { settings } = await readSchool(context.db);
  const print = { marks: (value: number) => showMarks(value, settings), of: (value: number) => showOf(value, settings) };
  return <OwnPaper paper={paper} sat={showDate(paper.startsAt, settings)} print={print} sentence={roundingSentence[paper.result.rule.rounding]} />;
}
