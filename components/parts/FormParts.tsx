'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Checkbox } from '@/components/ui/Checkbox';
import { useConfirm } from '@/components/ui/Confirm';
import { DateTimeInput } from '@/components/ui/DateTimeInput';
import { Dialog } from '@/components/ui/Dialog';
import { ErrorSummary, type FieldTrouble } from '@/components/ui/ErrorSummary';
import { FormGuard } from '@/components/ui/FormGuard';
import { RadioGroup } from '@/components/ui/RadioGroup';
import { Select } from '@/components/ui/Select';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import { Section } from './Section';

export function FormParts() {
  const [errors, setErrors] = useState<FieldTrouble[]>([]);
  const [attempt, setAttempt] = useState(0);
  const [dirty, setDirty] = useState(false);
  return (
    <Section title="Field">
      <FormGuard dirty={dirty} />
      <form
        noValidate
        className="fields"
        onChange={() => setDirty(true)}
        onSubmit={(event) => {
          event.preventDefault();
          const minutes = Number(new FormData(event.currentTarget).get('minutes'));
          const wrong = !Number.isInteger(minutes) || minutes < 10 || minutes > 300;
          setErrors(wrong ? [{ field: 'minutes', says: 'Write whole minutes, 10 to 300.' }] : []);
          setAttempt(attempt + 1);
          if (!wrong) setDirty(false);
        }}
      >
        <ErrorSummary errors={errors} attempt={attempt} />
        <TextInput label="Title" name="title" defaultValue="Direct-current machines" help="Printed on every paper." />
        <TextInput label="Time allowed" name="minutes" defaultValue="125.5" unit="minutes" inputMode="numeric" error={errors[0]?.says} />
        <TextInput label="Room" name="room" placeholder="Room or building" optional />
        <TextInput label="Set by the exam" name="fixed" defaultValue="120 min" disabled help="Changed on the exam, not here." />
        <Select
          label="Zone"
          name="zone"
          options={[
            { value: 'a', label: 'Mountain Time' },
            { value: 'b', label: 'Pacific Time' },
          ]}
        />
        <DateTimeInput label="Starts" name="starts" defaultValue="2025-11-20T09:25" zone="Mountain Time" />
        <TextArea label="Materials allowed" name="materials" defaultValue="Calculator and formula sheet" />
        <Checkbox label="Late-comers get full time" name="late" defaultChecked help="Each with a reason." />
        <RadioGroup
          label="Unit missing"
          name="unit"
          options={[
            { value: 'read', label: 'Read in the asked unit' },
            { value: 'lose', label: 'Lose the unit mark' },
          ]}
          defaultChecked={false}
        />
        <div className="btn-row">
          <Button look="main" type="submit">
            Save the exam
          </Button>
        </div>
      </form>
    </Section>
  );
}

export function DialogParts() {
  const [ask, question] = useConfirm();
  const [answer, setAnswer] = useState('');
  const [open, setOpen] = useState(false);
  const pause = () =>
    ask({
      title: 'Pause all 21 candidates?',
      says: 'Every screen goes blank and every clock stops. Time is restored exactly when you go on.',
      facts: [
        { label: 'Room', value: '114, classes E2-A and E2-B' },
        { label: 'Out of contact', value: '1, blanks on return' },
      ],
      keep: 'Keep running',
      verb: 'Pause all',
    });
  return (
    <Section title="Confirm, dialog">
      <div className="btn-row">
        <Button look="stop" onClick={() => void pause().then((yes) => setAnswer(yes ? 'paused' : 'kept running'))}>
          Pause the room
        </Button>
        <Button onClick={() => setOpen(true)}>Formula sheet</Button>
        <span role="status">{answer}</span>
      </div>
      {question}
      <Dialog open={open} onClose={() => setOpen(false)} title="Formula sheet" wide>
        <p>Back-EMF is supply voltage less the drop in the armature circuit.</p>
      </Dialog>
    </Section>
  );
}
