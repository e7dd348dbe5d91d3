import { useId, type ComponentProps, type ReactNode } from 'react';
import { StateMark } from './StateMark';
import type { StateOf } from './states';

type AnswerBoxProps = ComponentProps<'input'> & { reads: ReactNode; state: StateOf<'response'> };

/**
 * The look of an answer: number and unit in one box, beneath it what was understood (`reads`: "reads as 241.6 volts",
 * number in `<b>`) and where it is (`state`). Label it by `aria-labelledby` with the part's question. What it does
 * is the exam room's.
 */
export function AnswerBox({ reads, state, className, ...input }: AnswerBoxProps) {
  const under = useId();
  const unread = state === 'cannot be read';
  return (
    <div className="answer">
      <input
        type="text"
        autoComplete="off"
        autoCapitalize="off"
        autoCorrect="off"
        spellCheck={false}
        {...input}
        className={`answer__box${unread ? ' is-unread' : ''}${className ? ` ${className}` : ''}`}
        aria-describedby={under}
        aria-invalid={unread || undefined}
      />
      <div className="answer__under" id={under}>
        <span>{reads}</span>
        <StateMark thing="response" state={state} />
      </div>
    </div>
  );
}
