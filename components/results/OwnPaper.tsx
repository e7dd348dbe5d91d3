import { Breakdown, RuleLines } from '@/components/results/Breakdown';
import { MarkedQuestion } from '@/components/results/MarkedQuestion';
import { OutcomeMark } from '@/components/results/OutcomeMark';
import { LinkButton } from '@/components/ui/LinkButton';
import { MathText } from '@/components/ui/MathText';
import { PageHead } from '@/components/ui/PageHead';
import type { OwnPaper as Paper } from '@/lib/results/paper-queries';

type Props = { paper: Paper; sat: string; print: { marks: (value: number) => string; of: (value: number) => string }; sentence: string };

function Total({ paper, print }: Pick<Props, 'paper' | 'print'>) {
  const { result } = paper;
  return (
    <p className="mb-5 flex flex-wrap items-baseline gap-x-4">
      <b className="font-mono text-36 font-semibold">{print.marks(result.total)}</b>
      <span className="text-ink-soft">of {print.of(result.of)} marks, {print.marks(result.percent)} %</span>
      <span className="ml-auto text-18"><OutcomeMark outcome={result.outcome} withheld={false} /></span>
    </p>
  );
}

/** A student's marked paper: the result, then each question with the own answer, the key and the solution in the own numbers. */
export function OwnPaper({ paper, sat, print, sentence }: Props) {
  const { result } = paper;
  const absent = result.outcome === 'absent';
  return (
    <div className="mx-auto max-w-sheet">
      <PageHead title={paper.title} says={`Sat ${sat} in room ${paper.room}`} back={{ href: '/results', label: 'My results' }}>
        {paper.report && <LinkButton href={`/api/reports/${paper.report.id}`} document>Grade report (PDF)</LinkButton>}
      </PageHead>
      {absent ? <p className="text-18"><OutcomeMark outcome="absent" withheld={false} /></p> : (
        <>
          <Total paper={paper} print={print} />
          <Breakdown breakdown={result.breakdown} total={{ awarded: result.total, of: result.of, percent: result.percent }} print={print} />
          <RuleLines rule={result.rule} print={print} sentence={sentence} />
        </>
      )}
      <div className="mt-8 grid grid-cols-[minmax(0,1fr)] gap-6">
        {paper.questions.map((marked) => (
          <MarkedQuestion key={marked.number} marked={marked} words={{ answer: 'Your answer', rule: false }}>
            <div className="section section--cap">
              <h2 id={`solution-${marked.number}`}>Solution in your numbers</h2>
              <div className="overflow-x-auto pt-3" role="region" aria-label={`Solution of question ${marked.number}, scrolls sideways`} tabIndex={0}><MathText html={marked.solutionHtml} /></div>
            </div>
          </MarkedQuestion>
        ))}
      </div>
    </div>
  );
}
