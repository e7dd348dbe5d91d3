'use client';

import { useState } from 'react';
import { QuestionSheet } from '@/components/candidates/QuestionSheet';
import { Dialog } from '@/components/ui/Dialog';
import { Button } from '@/components/ui/Button';
import { MathText } from '@/components/ui/MathText';
import { Pairs } from '@/components/ui/Pairs';
import { QuestionStrip } from '@/components/ui/QuestionStrip';
import type { PaperContent } from '@/lib/exams/paper';
import { notationOf } from '@/lib/numeric/notation';
import type { Question } from '@/lib/templates/question';

const answeredOf = (question: Question, answers: ReadonlyMap<string, string>, number: number): number =>
  question.parts.filter((part) => (answers.get(`${number}.${part.part}`) ?? '') !== '').length;

function CoverPage({ paper }: { paper: PaperContent }) {
  return (
    <section className="sheet sheet--pad" aria-label="Cover page">
      <h2 className="mb-2 text-22">{paper.title}</h2>
      <Pairs
        pairs={[
          { label: 'Time allowed', value: `${paper.minutes} minutes` },
          { label: 'Marks', value: paper.marks },
          { label: 'On the bench', value: paper.materials.join('; ') },
          { label: 'To pass', value: paper.passRule.join(' ') },
        ]}
      />
      {paper.cover.instructionsHtml && <div className="mt-4"><MathText html={paper.cover.instructionsHtml} /></div>}
      {paper.cover.declaration && <p className="mt-4 max-w-measure"><b className="font-medium">Declaration.</b> {paper.cover.declaration}</p>}
    </section>
  );
}

/** A paper as its candidate sees it. What is typed here is read like an answer and goes nowhere. */
export function PaperPreview({ paper, locale }: { paper: PaperContent; locale: string }) {
  const [here, setHere] = useState(1);
  const [answers, setAnswers] = useState<ReadonlyMap<string, string>>(new Map());
  const [sheet, setSheet] = useState(false);
  const question = paper.questions[here - 1];
  const section = paper.sections.find((one) => one.first <= here && here <= one.last);
  const strip = paper.questions.map((one, index) => {
    const answered = answeredOf(one, answers, index + 1);
    return { number: index + 1, state: answered === 0 ? ('blank' as const) : answered === one.parts.length ? ('answered' as const) : ('in part' as const), says: answered > 0 && answered < one.parts.length ? `${answered} of ${one.parts.length}` : undefined };
  });
  return (
    <div className="mx-auto grid max-w-sheet grid-cols-[minmax(0,1fr)] gap-6">
      <CoverPage paper={paper} />
      {question && (
        <div className="sheet">
          <QuestionStrip questions={strip} here={here} onGo={setHere} />
          <div className="room__body">
            {section && section.first === here && section.instructionsHtml && <MathText html={section.instructionsHtml} />}
            <QuestionSheet
              key={here} question={question} place={{ number: here, of: paper.questions.length, ...(section?.title ? { section: section.title } : {}) }} notation={notationOf(locale)}
              answering={{
                answerOf: (part) => answers.get(`${here}.${part}`) ?? '',
                stateOf: (part) => (answers.get(`${here}.${part}`) ? 'answered' : 'blank'),
                onWrite: (part, text) => setAnswers((before) => new Map(before).set(`${here}.${part}`, text)),
              }}
            />
          </div>
          <div className="btn-row border-t border-rule p-4">
            {paper.formulaSheetHtml && <Button onClick={() => setSheet(true)}>Formula sheet</Button>}
            <span className="grow" />
            <Button disabled={here === 1} onClick={() => setHere(here - 1)}>Back</Button>
            <Button disabled={here === paper.questions.length} onClick={() => setHere(here + 1)}>Next</Button>
          </div>
        </div>
      )}
      <Dialog open={sheet} onClose={() => setSheet(false)} title="Formula sheet" wide>{paper.formulaSheetHtml && <MathText html={paper.formulaSheetHtml} />}</Dialog>
    </div>
  );
}
