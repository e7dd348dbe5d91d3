'use client';

import { useCallback, useId, useRef, useState, type ReactNode } from 'react';
import { Button } from './Button';
import { Modal } from './Dialog';
import { Pairs, type Pair } from './Pairs';

/**
 * title names the thing ("Pause all 21 candidates?"), says the consequence, verb is on the button ("Pause all"),
 * keep on the other ("Keep running"). look: `stop` for what harms, `main` for what merely ends.
 */
export type ConfirmQuestion = { title: string; says: string; verb: string; keep?: string; facts?: readonly Pair[]; look?: 'stop' | 'main' };

/** For what cannot be undone. The safe answer has the focus at first; Escape is the safe answer. */
export function Confirm({ open, question, onAnswer, large }: { open: boolean; question: ConfirmQuestion; onAnswer: (yes: boolean) => void; large?: boolean }) {
  const heading = useId();
  const size = large ? 'exam' : 'control';
  return (
    <Modal open={open} onClose={() => onAnswer(false)} labelledBy={heading} describedBy={`${heading}-says`}>
      <h2 id={heading}>{question.title}</h2>
      <p className="dialog__text" id={`${heading}-says`}>
        {question.says}
      </p>
      {question.facts && <Pairs pairs={question.facts} />}
      <div className="dialog__do">
        <Button size={size} data-first="true" onClick={() => onAnswer(false)}>
          {question.keep ?? 'Go back'}
        </Button>
        <Button size={size} look={question.look === 'main' ? 'main' : 'stop-main'} onClick={() => onAnswer(true)}>
          {question.verb}
        </Button>
      </div>
    </Modal>
  );
}

/** `const [ask, question] = useConfirm()`: render `question`, then `await ask({ … })` answers true or false. */
export function useConfirm(large = false): readonly [(question: ConfirmQuestion) => Promise<boolean>, ReactNode] {
  const [asked, setAsked] = useState<ConfirmQuestion | null>(null);
  const settle = useRef<((yes: boolean) => void) | null>(null);
  const ask = useCallback((question: ConfirmQuestion) => {
    settle.current?.(false);
    setAsked(question);
    return new Promise<boolean>((resolve) => {
      settle.current = resolve;
    });
  }, []);
  const answer = useCallback((yes: boolean) => {
    setAsked(null);
    settle.current?.(yes);
    settle.current = null;
  }, []);
  const node = <Confirm open={asked !== null} question={asked ?? { title: '', says: '', verb: '' }} onAnswer={answer} large={large} />;
  return [ask, node];
}
