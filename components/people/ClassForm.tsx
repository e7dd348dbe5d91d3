'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import type { ButtonLook } from '@/components/ui/button-class';
import { Checkbox } from '@/components/ui/Checkbox';
import { Dialog } from '@/components/ui/Dialog';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { FieldGroup } from '@/components/ui/Field';
import { Select } from '@/components/ui/Select';
import { TextInput } from '@/components/ui/TextInput';
import { type ClassInput, classSchema } from '@/lib/classes/model';
import type { Result } from '@/lib/result';

export type Named = { id: string; name: string };
type FieldsProps = { values: ClassInput; terms: readonly Named[]; instructors: readonly Named[]; save: (input: ClassInput) => Promise<Result<{ id: string }>> };

function Fields({ values, terms, instructors, save, onDone }: FieldsProps & { onDone: () => void }) {
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({ schema: classSchema, values, send: save, onDone });
  const { register } = form;
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} />
      <Select label="Term" error={says('termId')} options={terms.map((term) => ({ value: term.id, label: term.name }))} {...register('termId')} id="termId" />
      <TextInput label="Name" help="Short, such as EL2-B." error={says('name')} {...register('name')} id="name" />
      <TextInput label="Title" optional help="What is taught, such as Electrician, second period." error={says('title')} {...register('title')} id="title" />
      <FieldGroup label="Instructors" help={instructors.length === 0 ? 'Nobody holds the role of instructor yet.' : undefined} error={says('instructorIds')}>
        {instructors.map((one) => (
          <Checkbox key={one.id} label={one.name} value={one.id} {...register('instructorIds')} />
        ))}
      </FieldGroup>
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>
          Save the class
        </Button>
      </div>
    </form>
  );
}

/** A button, and the sheet on which a class is made or changed. */
export function ClassForm({ label, title, look, fields }: { label: string; title: string; look?: ButtonLook; fields: FieldsProps }) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button look={look} onClick={() => setOpen(true)}>
        {label}
      </Button>
      <Dialog open={open} onClose={() => setOpen(false)} title={title}>
        <Fields {...fields} onDone={() => setOpen(false)} />
      </Dialog>
    </>
  );
}
