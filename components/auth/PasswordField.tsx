'use client';

import { type ComponentProps, useId, useState } from 'react';
import { FieldError } from '@/components/ui/Field';

type Props = ComponentProps<'input'> & { label: string; error?: string; help?: React.ReactNode; tall?: boolean };

/** A password, hidden until somebody asks to see it. */
export function PasswordField({ label, error, help, tall, ...input }: Props) {
  const [shown, setShown] = useState(false);
  const made = useId();
  const id = input.id ?? made;
  const described = [error && `${id}-error`, help && `${id}-help`].filter(Boolean).join(' ');
  return (
    <div className="field">
      <div className="flex items-baseline justify-between">
        <label htmlFor={id} className="text-15 font-medium">{label}</label>
        <button type="button" className="-my-1 cursor-pointer py-1 text-15 text-enamel underline underline-offset-4" aria-pressed={shown} aria-label={`Show ${label.toLowerCase()}`} onClick={() => setShown(!shown)}>
          {shown ? 'Hide' : 'Show'}
        </button>
      </div>
      <input
        {...input}
        id={id}
        type={shown ? 'text' : 'password'}
        className={`input${tall ? ' input--lg' : ''}`}
        aria-invalid={error ? true : undefined}
        aria-describedby={described || undefined}
        spellCheck={false}
        autoCapitalize="none"
      />
      {error && <FieldError id={`${id}-error`} says={error} />}
      {help && (
        <p className="help" id={`${id}-help`}>
          {help}
        </p>
      )}
    </div>
  );
}
