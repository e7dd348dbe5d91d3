'use client';

import { useRouter } from 'next/navigation';
import { type ChangeEvent, useState } from 'react';
import type { UseFormReturn } from 'react-hook-form';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { DateTimeInput } from '@/components/ui/DateTimeInput';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { FieldGroup } from '@/components/ui/Field';
import { FormGuard } from '@/components/ui/FormGuard';
import { LinkButton } from '@/components/ui/LinkButton';
import { Select } from '@/components/ui/Select';
import { TextInput } from '@/components/ui/TextInput';
import { type NewSitting, newSitting } from '@/lib/planning/model';
import type { Result } from '@/lib/result';

export type PlanChoices = {
  classes: { id: string; name: string; term: string; students: number }[];
  forms: { id: string; title: string; number: number; marks: number; minutes: number; questions: number }[];
  proctors: { id: string; name: string }[];
  /** The school's zone in words. */
  zone: string;
};
type Props = { choices: PlanChoices; values: NewSitting; send: (input: NewSitting) => Promise<Result<{ sittingId: string }>>; mode: 'new' | 'change'; back: string };
type Says = (field: keyof NewSitting) => string | undefined;
type Form = UseFormReturn<NewSitting, unknown, NewSitting>;

/** Adds minutes to what a date-and-time field holds. */
function shifted(local: string, minutes: number): string {
  const time = new Date(`${local}:00Z`);
  return Number.isNaN(time.getTime()) ? local : new Date(time.getTime() + minutes * 60_000).toISOString().slice(0, 16);
}

function WhatFields({ form, says, choices }: { form: Form; says: Says; choices: PlanChoices }) {
  const forms = choices.forms.map((one) => ({ value: one.id, label: `${one.title}, form ${one.number}: ${one.questions} questions, ${one.marks} marks, ${one.minutes} min` }));
  const classes = choices.classes.map((one) => ({ value: one.id, label: `${one.name}, ${one.term}: ${one.students} students` }));
  const title = (event: ChangeEvent<HTMLSelectElement>) => {
    const chosen = choices.forms.find((one) => one.id === event.target.value);
    if (chosen && !form.formState.dirtyFields.title) form.setValue('title', chosen.title);
  };
  return (
    <>
      <Select label="Form" help="Approved forms of exams that are not retired." error={says('formId')} options={[{ value: '', label: 'Choose a form' }, ...forms]} {...form.register('formId', { onChange: title })} id="formId" />
      <Select label="Class" help="Everybody enrolled on the day becomes a candidate." error={says('classId')} options={[{ value: '', label: 'Choose a class' }, ...classes]} {...form.register('classId')} id="classId" />
    </>
  );
}

function WhenFields({ form, says, zone }: { form: Form; says: Says; zone: string }) {
  const follow = (event: ChangeEvent<HTMLInputElement>) => {
    const { dirtyFields } = form.formState;
    if (!dirtyFields.opensAt) form.setValue('opensAt', shifted(event.target.value, -30));
    if (!dirtyFields.latestStartAt) form.setValue('latestStartAt', shifted(event.target.value, 30));
  };
  return (
    <>
      <DateTimeInput label="Start" zone={zone} error={says('startsAt')} {...form.register('startsAt', { onChange: follow })} id="startsAt" />
      <DateTimeInput label="Check-in opens" zone={zone} error={says('opensAt')} {...form.register('opensAt')} id="opensAt" />
      <DateTimeInput label="Latest start" help="Who comes later is let in only by the proctor's decision." zone={zone} error={says('latestStartAt')} {...form.register('latestStartAt')} id="latestStartAt" />
    </>
  );
}

/** Plans a sitting or changes its plan; what it is of (form, class) is fixed once it is planned. */
export function SittingForm({ choices, values, send, mode, back }: Props) {
  const router = useRouter();
  const [gone, setGone] = useState(false);
  const { form, submit, troubles, says, attempt, busy, dirty } = useSchemaForm({
    schema: newSitting, values, send,
    onDone: ({ sittingId }) => {
      setGone(true);
      router.push(`/sittings/${sittingId}`);
    },
  });
  return (
    <form onSubmit={submit} noValidate className="fields">
      <FormGuard dirty={dirty && !busy && !gone} />
      <ErrorSummary errors={troubles} attempt={attempt} />
      {mode === 'new' && <WhatFields form={form} says={says} choices={choices} />}
      <TextInput label="Title" help="As candidates and proctors see it." error={says('title')} {...form.register('title')} id="title" />
      <TextInput label="Room" error={says('room')} {...form.register('room')} id="room" />
      <WhenFields form={form} says={says} zone={choices.zone} />
      <FieldGroup label="Proctors" help="They alone open check-in, admit and start." error={says('proctors')}>
        {choices.proctors.map((proctor) => (
          <label className="check" key={proctor.id}>
            <input type="checkbox" className="tick" value={proctor.id} {...form.register('proctors')} />
            <span>{proctor.name}</span>
          </label>
        ))}
        {choices.proctors.length === 0 && <p className="text-15 text-ink-soft">Nobody holds the role proctor: ask a registrar to give it out.</p>}
      </FieldGroup>
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>{mode === 'new' ? 'Schedule the sitting' : 'Save the plan'}</Button>
        <LinkButton href={back}>Go back</LinkButton>
      </div>
    </form>
  );
}
