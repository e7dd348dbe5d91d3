import type { ComponentProps } from 'react';
import { Field, type FieldContract } from './Field';

/** Several lines of text: the Field contract plus every attribute of `<textarea>`. */
export function TextArea({ label, help, error, optional, className, ...area }: FieldContract & ComponentProps<'textarea'>) {
  return (
    <Field label={label} help={help} error={error} optional={optional} id={area.id}>
      {(control) => <textarea rows={4} {...area} {...control} className={`input${className ? ` ${className}` : ''}`} />}
    </Field>
  );
}
