import type { ReactNode } from 'react';
import { Figures } from '@/components/ui/Figures';
import { MathText } from '@/components/ui/MathText';
import { Pairs, type Pair } from '@/components/ui/Pairs';
import { StateMark } from '@/components/ui/StateMark';
import { type PartMark, ruleSays } from '@/lib/results/model';
import type { QuestionPart } from '@/lib/templates/question';

const optionOf = (part: QuestionPart, letter: string) => part.options?.find((option) => option.option === letter.trim().toUpperCase());

function Answer({ part, mark }: { part: QuestionPart; mark: PartMark }) {
  if (mark.answer.trim() === '') return <span className="text-ink-soft">nothing</span>;
  const option = optionOf(part, mark.answer);
  if (option) return <><b className="font-medium">{option.option}</b> <MathText html={option.html} inline /></>;
  return <span className="num break-words">{mark.answer}</span>;
}

function pairsOf(part: QuestionPart, mark: PartMark, words: Words): Pair[] {
  const reads = part.options ? '' : (mark.reads?.text ?? '');
  return [
    { label: words.answer, value: <Answer part={part} mark={mark} /> },
    ...(reads ? [{ label: 'Reads as', value: reads }] : []),
    { label: 'Key', value: part.options ? mark.key.text : <span className="num"><Figures text={mark.key.text} /></span> },
    ...(words.rule ? [{ label: 'Rule', value: ruleSays[mark.rule] ?? mark.rule }] : []),
    ...(mark.marker && words.rule ? [{ label: 'Decided by', value: `${mark.marker}: ${mark.reason}` }] : []),
  ];
}

export type Words = { answer: string; rule: boolean };

/** One part as it was marked: what was asked and answered, the key, the verdict with its reason, and the marks. */
export function MarkedPart({ part, mark, words, children }: { part: QuestionPart; mark: PartMark | undefined; words: Words; children?: ReactNode }) {
  return (
    <section className="part part--stacked" aria-label={mark ? `Question ${mark.question} part ${part.part}` : `Part ${part.part}`}>
      <span className="part__l" aria-hidden="true">{part.part}</span>
      <div className="part__ask"><MathText html={part.askHtml} inline /></div>
      <div className="min-w-0">
        {mark ? (
          <>
            <div className="flex flex-wrap items-baseline justify-between gap-x-4 gap-y-1">
              <StateMark thing="verdict" state={mark.verdict} />
              <span className="num text-16"><b className="font-semibold">{mark.awarded}</b> of {mark.of}</span>
            </div>
            {mark.says && mark.verdict !== 'correct' && <p className="mt-1 max-w-measure text-15">{mark.says}</p>}
            <div className="mt-2"><Pairs pairs={pairsOf(part, mark, words)} /></div>
            {children}
          </>
        ) : <p className="text-15 text-ink-soft">Not marked yet.</p>}
      </div>
    </section>
  );
}
