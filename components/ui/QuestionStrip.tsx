'use client';

import { useEffect, useRef } from 'react';
import { Shape } from './Shape';
import { lookOf } from './states';

export type StripState = 'blank' | 'in part' | 'answered' | 'flagged' | 'kept here';
export type StripQuestion = { number: number; state: StripState; says?: string };

/** The index of the sheet: number, shape and word of each question; `says` replaces the word ("2 of 3"). `here` is the open number. */
export function QuestionStrip({ questions, here, onGo }: { questions: readonly StripQuestion[]; here: number; onGo: (number: number) => void }) {
  const strip = useRef<HTMLElement>(null);
  useEffect(() => {
    const open = strip.current?.querySelector<HTMLElement>('[aria-current]');
    if (open && strip.current) strip.current.scrollLeft = open.offsetLeft - strip.current.clientWidth / 2 + open.clientWidth / 2;
  }, [here]);
  return (
    <nav className="strip" aria-label="Questions" ref={strip}>
      {questions.map((question) => {
        const look = lookOf('response', question.state);
        return (
          <button type="button" key={question.number} aria-current={question.number === here ? 'step' : undefined} onClick={() => onGo(question.number)}>
            <span className="no">
              <span className="vh">Question </span>
              {question.number}
              <span className={`flex c-${look.tone}`}>
                <Shape name={look.shape} />
              </span>
            </span>
            <span className="w">{question.says ?? look.word}</span>
          </button>
        );
      })}
    </nav>
  );
}
