'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import type { ButtonLook } from '@/components/ui/button-class';
import { DateTimeInput } from '@/components/ui/DateTimeInput';
import { Dialog } from '@/components/ui/Dialog';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { TextInput } from '@/components/ui/TextInput';
import { type TermInput, termSchema } from '@/lib/classes/model';
import type { Result } from '@/lib/result';

type Props = { label: string; title: string; values: TermInput; save: (input: TermInput) => Promise<Result<{ id: string }>>; look?: ButtonLook; dense?: boolean };

function Fields({ values, save, onDone }: Pick<Props, 'values' | 'save'> & { onDone: () => void }) {
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({ schema: termSchema, values, send: save, onDone });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} />
      <TextInput label="Name" help="As it stands at the door and on reports, such as Autumn 2026." error={says('name')} {...form.register('name')} id="name" />
      <DateTimeInput label="First day" type="date" step={1} error={says('startsOn')} {...form.register('startsOn')} id="startsOn" />
      <DateTimeInput label="Last day" type="date" step={1} error={says('endsOn')} {...form.register('endsOn')} id="endsOn" />
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>
          Save the term
        </Button>
      </div>
    </form>
  );
}

/** A button, and the sheet on which a term is made or changed. */
export function TermForm({ label, title, look, dense, ...fields }: Props) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button look={look} size={dense ? 'dense' : 'control'} onClick={() => setOpen(true)}>
        {label}
      </Button>
      <Dialog open={open} onClose={() => setOpen(false)} title={title}>
        <Fields {...fields} onDone={() => setOpen(false)} />
      </Dialog>
    </>
  );
}
