import type { ComponentProps } from 'react';
import { Field, type FieldContract } from './Field';

/**
 * A day and time of the clock on the wall, `YYYY-MM-DDTHH:mm`, with the zone written out beside it:
 * the server turns it into an instant in that zone. With `type="date"` a day alone.
 */
export function DateTimeInput({ label, help, error, optional, zone, ...input }: FieldContract & ComponentProps<'input'> & { zone?: string }) {
  return (
    <Field label={label} help={help} error={error} optional={optional} id={input.id}>
      {(control) => (
        <div className="input-row">
          <input type="datetime-local" step={60} {...input} {...control} className="input" />
          {zone && <span className="unit">{zone}</span>}
        </div>
      )}
    </Field>
  );
}
