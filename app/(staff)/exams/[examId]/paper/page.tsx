import type { Metadata } from 'next';
import Form from 'next/form';
import { notFound } from 'next/navigation';
import { PaperPreview } from '@/components/exams/PaperPreview';
import { Button } from '@/components/ui/Button';
import { LinkButton } from '@/components/ui/LinkButton';
import { Notice } from '@/components/ui/Notice';
import { PageHead } from '@/components/ui/PageHead';
import { pageContext } from '@/lib/auth/context';
import { previewPaper } from '@/lib/exams/preview';
import { examPage } from '@/lib/exams/queries';

export const metadata: Metadata = { title: 'A paper as a candidate sees it' };

type Props = { params: Promise<{ examId: string }>; searchParams: Promise<{ seed?: string | string[] }> };

const after = (seed: string): string => {
  const [, head = '', digits = ''] = /^(.*?)(\d*)$/.exec(seed) ?? [];
  return digits.length > 0 && digits.length < 9 ? `${head}${Number(digits) + 1}` : `${seed}-1`;
};

export default async function PaperPage({ params, searchParams }: Props) {
  const { examId } = await params;
  const asked = (await searchParams).seed;
  const seed = (typeof asked === 'string' ? asked.trim() : '').slice(0, 80) || '1';
  const context = await pageContext('instructor');
  const exam = await examPage(context, examId);
  if (!exam.ok) notFound();
  const paper = await previewPaper(context, examId, seed);
  return (
    <>
      <PageHead title="A paper as a candidate sees it" says={`${exam.value.title}, as saved. No sitting draws from these seeds, and nothing here is kept.`} back={{ href: `/exams/${examId}`, label: exam.value.title }}>
        <Form action={`/exams/${examId}/paper`} className="btn-row">
          <label className="flex items-center gap-2 text-15">Seed <input className="input input--mono w-28" name="seed" defaultValue={seed} key={seed} maxLength={80} autoComplete="off" /></label>
          <Button type="submit">Draw</Button>
          <LinkButton href={`/exams/${examId}/paper?seed=${encodeURIComponent(after(seed))}`} look="main">Another draw</LinkButton>
        </Form>
      </PageHead>
      {paper.ok ? paper.value.questions.length > 0 ? <PaperPreview key={seed} paper={paper.value} locale={exam.value.content.locale} /> : <Notice kind="info">There is no question on the exam yet.</Notice> : <Notice kind="stop">{paper.says}</Notice>}
    </>
  );
}
