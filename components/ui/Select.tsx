import type { ComponentProps } from 'react';
import { Field, type FieldContract } from './Field';
import { Shape } from './Shape';

export type SelectOption = { value: string; label: string; disabled?: boolean };

/** The bare box with our arrow round a native `<select>`, for tool bars; give it an `aria-label`. */
export function SelectBox({ options, className, ...select }: ComponentProps<'select'> & { options: readonly SelectOption[] }) {
  return (
    <span className="select">
      <select {...select} className={`input${className ? ` ${className}` : ''}`}>
        {options.map((option) => (
          <option key={option.value} value={option.value} disabled={option.disabled}>
            {option.label}
          </option>
        ))}
      </select>
      <Shape name="arrow" />
    </span>
  );
}

/** One of a list: the Field contract plus every attribute of `<select>`. */
export function Select({ label, help, error, optional, ...select }: FieldContract & ComponentProps<typeof SelectBox>) {
  return (
    <Field label={label} help={help} error={error} optional={optional} id={select.id}>
      {(control) => <SelectBox {...select} {...control} />}
    </Field>
  );
}
