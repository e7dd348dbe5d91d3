'use client';

import { useId } from 'react';
import { Caution } from '@/components/ui/Caution';
import { Choice } from '@/components/ui/Choice';
import { MathText } from '@/components/ui/MathText';
import { RatingPlate } from '@/components/ui/RatingPlate';
import { StateMark } from '@/components/ui/StateMark';
import type { StateOf } from '@/components/ui/states';
import type { Notation } from '@/lib/numeric/notation';
import type { Question } from '@/lib/templates/question';
import { AnswerField } from './AnswerField';

type QuestionPart = Question['parts'][number];
export type Answering = {
  answerOf: (part: string) => string;
  stateOf: (part: string) => StateOf<'response'>;
  /** Absent where a paper is only looked at. */
  onWrite?: (part: string, text: string) => void;
};
type QuestionSheetProps = { question: Question; place: { number: number; of: number; section?: string }; notation: Notation; answering: Answering; headingId?: string };

const marksInWords = (marks: number): string => `${marks} ${marks === 1 ? 'mark' : 'marks'}`;

function ChoicePart({ part, answering }: { part: QuestionPart; answering: Answering }) {
  const { answerOf, stateOf, onWrite } = answering;
  const value = answerOf(part.part);
  return (
    <div className="answer">
      <Choice
        label={`Part ${part.part}`}
        options={(part.options ?? []).map((option) => ({ value: option.option, text: <><b>{option.option}</b>{' '}<MathText html={option.html} inline /></> }))}
        value={value}
        disabled={!onWrite}
        onChange={(option) => onWrite?.(part.part, option)}
      />
      <div className="answer__under">
        {value && onWrite ? <button type="button" className="btn btn--quiet btn--sm" onClick={() => onWrite(part.part, '')}>Take my choice back</button> : <span>choose one</span>}
        <StateMark thing="response" state={stateOf(part.part)} />
      </div>
    </div>
  );
}

function Part({ part, notation, answering }: { part: QuestionPart; notation: Notation; answering: Answering }) {
  const id = useId();
  const { answerOf, stateOf, onWrite } = answering;
  const hints = [marksInWords(part.marks), ...(part.figures ? [`give ${part.figures} figures`] : [])];
  return (
    <section className={`part${part.options ? ' part--stacked' : ''}`} aria-labelledby={id}>
      <span className="part__l" aria-hidden="true">{part.part}</span>
      <div className="part__ask" id={id}>
        <span className="vh">Part {part.part}. </span>
        <MathText html={part.askHtml} inline />
        <small>{hints.join(' · ')}</small>
      </div>
      {part.options ? (
        <ChoicePart part={part} answering={answering} />
      ) : (
        <AnswerField
          labelledBy={id}
          asked={{ unit: part.unit ?? 'none', notation, ...(part.ratio ? { ratio: true } : {}) }}
          value={answerOf(part.part)}
          state={stateOf(part.part)}
          {...(onWrite ? { onWrite: (text: string) => onWrite(part.part, text) } : {})}
        />
      )}
    </section>
  );
}

/** One question as a candidate sees it: plate, stem, parts with their answers, and the safety line. */
export function QuestionSheet({ question, place, notation, answering, headingId }: QuestionSheetProps) {
  // In the room the question is the page; looked at by staff it stands under the page's own heading.
  const Heading = headingId ? 'h1' : 'h2';
  return (
    <>
      <div className="q__head">
        <Heading id={headingId} tabIndex={-1}>Question {place.number}</Heading>
        <span>
          of {place.of} · {marksInWords(question.marks)} · about {question.minutes} minutes{place.section ? ` · ${place.section}` : ''}
        </span>
      </div>
      {question.plate.length > 0 && <RatingPlate kind="drawn" label="Given values" cells={question.plate} />}
      <div className="stem">
        <MathText html={question.stemHtml} />
      </div>
      {question.conventions.length > 0 && <p className="soft t15 q__conventions">{question.conventions.join(' · ')}</p>}
      {question.parts.map((part) => (
        <Part key={part.part} part={part} notation={notation} answering={answering} />
      ))}
      {question.cautions.map((caution) => (
        <Caution key={caution.title} title={caution.title}>
          <MathText html={caution.html} inline />
        </Caution>
      ))}
    </>
  );
}
