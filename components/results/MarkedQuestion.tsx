import type { ReactNode } from 'react';
import { Caution } from '@/components/ui/Caution';
import { MathText } from '@/components/ui/MathText';
import { RatingPlate } from '@/components/ui/RatingPlate';
import type { PartMark } from '@/lib/results/model';
import type { MarkedQuestion as Marked } from '@/lib/results/paper-queries';
import { MarkedPart, type Words } from './MarkedPart';

type Props = {
  marked: Marked;
  words: Words;
  /** What stands under a part: a marker's tools. */
  under?: (mark: PartMark) => ReactNode;
  /** What stands after the parts: the solution. */
  children?: ReactNode;
};

/** A question as the candidate saw it, with how each part was marked. */
export function MarkedQuestion({ marked, words, under, children }: Props) {
  const { question, number } = marked;
  return (
    <section className="sheet sheet--pad" id={`question-${number}`} aria-labelledby={`question-${number}-head`}>
      <div className="q__head">
        <h2 id={`question-${number}-head`}>Question {number}</h2>
        <span>{marked.section && `${marked.section} · `}<b className="num font-semibold text-ink">{marked.awarded}</b> of {marked.of} marks</span>
      </div>
      {question.plate.length > 0 && <RatingPlate kind="drawn" label="Given values" cells={question.plate} />}
      <div className="stem"><MathText html={question.stemHtml} /></div>
      {question.conventions.length > 0 && <p className="soft t15 q__conventions">{question.conventions.join(' · ')}</p>}
      {question.parts.map((part) => {
        const mark = marked.marks.find((one) => one.part === part.part);
        return <MarkedPart key={part.part} part={part} mark={mark} words={words}>{mark && under?.(mark)}</MarkedPart>;
      })}
      {children}
      {question.cautions.map((caution) => (
        <Caution key={caution.title} title={caution.title}><MathText html={caution.html} inline /></Caution>
      ))}
    </section>
  );
}
