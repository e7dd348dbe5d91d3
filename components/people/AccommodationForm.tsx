'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { Checkbox } from '@/components/ui/Checkbox';
import { DateTimeInput } from '@/components/ui/DateTimeInput';
import { Dialog } from '@/components/ui/Dialog';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import { type AccommodationInput, accommodationSchema } from '@/lib/accommodations/model';
import type { Result } from '@/lib/result';

type Props = { today: string; give: (input: AccommodationInput) => Promise<Result<{ id: string }>> };

const figure = { valueAsNumber: true } as const;

function Fields({ today, give, onDone }: Props & { onDone: () => void }) {
  const values: AccommodationInput = { extraPercent: 0, extraMinutes: 0, restMinutes: 0, largePrint: false, separateRoom: false, reason: '', since: today, until: '' };
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({ schema: accommodationSchema, values, send: give, onDone });
  const { register } = form;
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} />
      <div className="grid gap-5 sm:grid-cols-3">
        <TextInput label="Extra time" unit="%" inputMode="decimal" type="number" step="0.1" min={0} error={says('extraPercent')} {...register('extraPercent', figure)} id="extraPercent" />
        <TextInput label="And extra" unit="minutes" inputMode="numeric" type="number" min={0} error={says('extraMinutes')} {...register('extraMinutes', figure)} id="extraMinutes" />
        <TextInput label="Rest breaks" unit="minutes" inputMode="numeric" type="number" min={0} error={says('restMinutes')} {...register('restMinutes', figure)} id="restMinutes" />
      </div>
      <p className="text-13 text-ink-soft">120 minutes and 25 % end at 150:00. Rest breaks stop the clock; they are not extra time.</p>
      <div>
        <Checkbox label="Large print" {...register('largePrint')} />
        <Checkbox label="Separate room" {...register('separateRoom')} />
      </div>
      <div className="grid gap-5 sm:grid-cols-2">
        <DateTimeInput label="From" type="date" step={1} error={says('since')} {...register('since')} id="since" />
        <DateTimeInput label="Until" optional type="date" step={1} error={says('until')} {...register('until')} id="until" />
      </div>
      <TextArea label="Reason" optional help="Registrars see it. Proctors and instructors see the need alone." rows={2} error={says('reason')} {...register('reason')} id="reason" />
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>
          Give the accommodation
        </Button>
      </div>
    </form>
  );
}

/** The button for a new accommodation, and the sheet that asks for it. */
export function AccommodationForm({ today, give }: Props) {
  const [open, setOpen] = useState(false);
  return (
    <>
      <Button onClick={() => setOpen(true)}>Give an accommodation</Button>
      <Dialog open={open} onClose={() => setOpen(false)} title="Accommodation" wide>
        <Fields today={today} give={give} onDone={() => setOpen(false)} />
      </Dialog>
    </>
  );
}
