import type { ComponentProps } from 'react';
import { FieldGroup, type FieldContract } from './Field';

export type RadioOption = { value: string; label: string; disabled?: boolean };
type RadioProps = FieldContract & { options: readonly RadioOption[] } & Omit<ComponentProps<'input'>, 'value'> & { value?: string };

/**
 * One of a few on a staff screen, each on its line. Controlled with `value` and `onChange`, or spread
 * `register('name')` on it. The exam room's is Choice.
 */
export function RadioGroup({ label, help, error, optional, options, value, ...input }: RadioProps) {
  return (
    <FieldGroup label={label} help={help} error={error} optional={optional}>
      {options.map((option) => (
        <label className="check" key={option.value}>
          <input
            {...input}
            type="radio"
            className="dot"
            style={{ marginTop: 4 }}
            value={option.value}
            disabled={input.disabled || option.disabled}
            checked={value === undefined ? undefined : value === option.value}
          />
          <span>{option.label}</span>
        </label>
      ))}
    </FieldGroup>
  );
}
