import { useId, type ReactNode } from 'react';

export type ChoiceOption = { value: string; text: ReactNode };

/**
 * One of a few, each with its whole text (exam room). `label` is for a screen reader; `value` '' is none yet;
 * `row` lays short options side by side where there is room.
 */
export function Choice(props: { label: string; options: readonly ChoiceOption[]; value: string; onChange: (value: string) => void; disabled?: boolean; row?: boolean }) {
  const name = useId();
  return (
    <div className={`choices${props.row ? ' choices--row' : ''}`} role="radiogroup" aria-label={props.label}>
      {props.options.map((option) => (
        <label className="choice" key={option.value}>
          <input
            type="radio"
            className="dot"
            name={name}
            value={option.value}
            checked={props.value === option.value}
            disabled={props.disabled}
            onChange={() => props.onChange(option.value)}
          />
          <span>{option.text}</span>
        </label>
      ))}
    </div>
  );
}
