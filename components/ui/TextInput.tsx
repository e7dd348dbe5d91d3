import type { ComponentProps, ReactNode } from 'react';
import { Field, type FieldContract } from './Field';

type TextInputProps = FieldContract & ComponentProps<'input'> & { tall?: boolean; unit?: ReactNode };

/**
 * A line of text: the Field contract plus every attribute of `<input>`; spread `register('name')` on it.
 * `unit` stands behind the box ("minutes"); `tall` is the 48 px box of the door and the exam.
 */
export function TextInput({ label, help, error, optional, tall, unit, className, ...input }: TextInputProps) {
  return (
    <Field label={label} help={help} error={error} optional={optional} id={input.id}>
      {(control) => {
        const box = <input type="text" {...input} {...control} className={`input${tall ? ' input--lg' : ''}${className ? ` ${className}` : ''}`} />;
        return unit ? (
          <div className="input-row">
            {box}
            <span className="unit">{unit}</span>
          </div>
        ) : (
          box
        );
      }}
    </Field>
  );
}
