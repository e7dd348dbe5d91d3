import { useId, type ComponentProps, type ReactNode } from 'react';
import { FieldError } from './Field';

/** One yes or no: the whole line is the target; takes every attribute of `<input type="checkbox">`. */
export function Checkbox({ label, help, error, ...input }: ComponentProps<'input'> & { label: ReactNode; help?: ReactNode; error?: string }) {
  const own = useId();
  const described = [error && `${own}-error`, help && `${own}-help`].filter(Boolean).join(' ');
  return (
    <div>
      <label className="check">
        <input {...input} type="checkbox" className="tick" aria-describedby={described || undefined} aria-invalid={error ? true : undefined} />
        <span>{label}</span>
      </label>
      {error && <FieldError id={`${own}-error`} says={error} />}
      {help && (
        <p className="help" id={`${own}-help`}>
          {help}
        </p>
      )}
    </div>
  );
}
