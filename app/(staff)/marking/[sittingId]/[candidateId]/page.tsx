import type { Metadata } from 'next';
import { notFound } from 'next/navigation';
import { cache } from 'react';
import { OverrideForm } from '@/components/marking/OverrideForm';
import { WithholdForm } from '@/components/marking/WithholdForm';
import { MarkedQuestion } from '@/components/results/MarkedQuestion';
import { OutcomeMark, ResultMark } from '@/components/results/OutcomeMark';
import { EmptyState } from '@/components/ui/EmptyState';
import { LinkButton } from '@/components/ui/LinkButton';
import { PageHead } from '@/components/ui/PageHead';
import { RatingPlate } from '@/components/ui/RatingPlate';
import { pageContext } from '@/lib/auth/context';
import { candidatePaper } from '@/lib/results/paper-queries';
import { showMarks, showOf } from '@/lib/results/show';
import { readSchool } from '@/lib/school/queries';
import { overrideMarkAction, withholdResultAction } from '../../actions';

type Props = { params: Promise<{ sittingId: string; candidateId: string }> };

const load = cache(async (sittingId: string, candidateId: string) => {
  const context = await pageContext('instructor');
  const paper = await candidatePaper(context, sittingId, candidateId);
  if (!paper.ok) notFound();
  return { context, paper: paper.value };
});

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const { sittingId, candidateId } = await params;
  return { title: `Paper of ${(await load(sittingId, candidateId)).paper.name}` };
}

export default async function MarkedPaperPage({ params }: Props) {
  const { sittingId, candidateId } = await params;
  const { context, paper } = await load(sittingId, candidateId);
  const { settings } = await readSchool(context.db);
  const { result, neighbours } = paper;
  const cells = [
    { label: 'Learner number', value: paper.learnerNumber ?? 'none' },
    { label: 'Seat', value: paper.seat || 'none' },
    { label: 'Paper', value: paper.candidateState },
    { label: 'Total', value: result && result.outcome !== 'absent' ? `${showMarks(result.total, settings)} of ${showOf(result.of, settings)}, ${showMarks(result.percent, settings)} %` : 'none' },
  ];
  const before = result?.state === 'provisional' || result?.state === 'moderated';
  return (
    <div className="mx-auto max-w-sheet">
      <PageHead
        title={paper.name} back={{ href: `/marking/${sittingId}`, label: paper.sitting.title }}
        says={result ? <><OutcomeMark outcome={result.outcome} withheld={result.withheld} /> · <ResultMark state={result.state} withheld={result.withheld} /></> : 'Not marked yet'}
      >
        {neighbours.before && <LinkButton href={`/marking/${sittingId}/${neighbours.before}`}>Paper before</LinkButton>}
        {neighbours.after && <LinkButton href={`/marking/${sittingId}/${neighbours.after}`}>Next paper</LinkButton>}
        {result && before && <WithholdForm candidateId={paper.candidateId} withheld={result.withheld} withhold={withholdResultAction} />}
      </PageHead>
      <RatingPlate kind="record" label="The candidate" cells={cells} columns={4} />
      <div className="mt-6 grid grid-cols-[minmax(0,1fr)] gap-6">
        {paper.questions.length === 0 || result?.outcome === 'absent' ? <EmptyState title="No paper to look at" says="This candidate did not sit." /> : paper.questions.map((marked) => (
          <MarkedQuestion
            key={marked.number} marked={marked} words={{ answer: 'Answered', rule: true }}
            under={(mark) => paper.mayOverride && <OverrideForm candidateId={paper.candidateId} mark={{ question: mark.question, part: mark.part, issue: mark.issue, awarded: mark.awarded, of: mark.of }} override={overrideMarkAction} />}
          />
        ))}
      </div>
    </div>
  );
}
