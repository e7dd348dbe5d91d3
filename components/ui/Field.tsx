import { useId, type ReactNode } from 'react';
import { Shape } from './Shape';

/** What every field takes: a label above, help below, an error beside; `optional` is said in words. */
export type FieldContract = { label: ReactNode; help?: ReactNode; error?: string; optional?: boolean };

/** What a control inside a Field must spread on itself. */
export type ControlProps = { id: string; 'aria-describedby': string | undefined; 'aria-invalid': true | undefined };

export function FieldError({ id, says }: { id?: string; says: string }) {
  return (
    <p className="error" id={id}>
      <Shape name="cross" />
      <span>{says}</span>
    </p>
  );
}

/** The label/help/error contract round one control: `<Field label="Room">{(control) => <input {...control} />}</Field>`. */
export function Field({ label, help, error, optional, id, children }: FieldContract & { id?: string; children: (control: ControlProps) => ReactNode }) {
  const made = useId();
  const own = id ?? made;
  const described = [error && `${own}-error`, help && `${own}-help`].filter(Boolean).join(' ');
  return (
    <div className="field">
      <label htmlFor={own}>
        {label}
        {optional && <span className="field__optional"> (optional)</span>}
      </label>
      {children({ id: own, 'aria-describedby': described || undefined, 'aria-invalid': error ? true : undefined })}
      {error && <FieldError id={`${own}-error`} says={error} />}
      {help && (
        <p className="help" id={`${own}-help`}>
          {help}
        </p>
      )}
    </div>
  );
}

/** The same contract round several controls of one question: a fieldset with its legend. */
export function FieldGroup({ label, help, error, optional, children }: FieldContract & { children: ReactNode }) {
  const own = useId();
  const described = [error && `${own}-error`, help && `${own}-help`].filter(Boolean).join(' ');
  return (
    <fieldset className="field" aria-describedby={described || undefined}>
      <legend>
        {label}
        {optional && <span className="field__optional"> (optional)</span>}
      </legend>
      {children}
      {error && <FieldError id={`${own}-error`} says={error} />}
      {help && (
        <p className="help" id={`${own}-help`}>
          {help}
        </p>
      )}
    </fieldset>
  );
}
