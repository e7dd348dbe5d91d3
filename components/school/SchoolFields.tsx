'use client';

import type { ReactNode } from 'react';
import type { UseFormRegister } from 'react-hook-form';
import { Checkbox } from '@/components/ui/Checkbox';
import { RadioGroup } from '@/components/ui/RadioGroup';
import { Select } from '@/components/ui/Select';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import type { SchoolInput } from '@/lib/school/model';

type Fields = { register: UseFormRegister<SchoolInput>; says: (field: keyof SchoolInput) => string | undefined };

const locales = [
  { value: 'en-CA', label: 'English, Canada (1,234.5)' },
  { value: 'en-US', label: 'English, United States (1,234.5)' },
  { value: 'en-GB', label: 'English, United Kingdom (1,234.5)' },
  { value: 'en-IE', label: 'English, Ireland (1,234.5)' },
  { value: 'en-AU', label: 'English, Australia (1,234.5)' },
  { value: 'en-ZA', label: 'English, South Africa (1 234,5)' },
  { value: 'fr-CA', label: 'French, Canada (1 234,5)' },
  { value: 'de-DE', label: 'German, Germany (1.234,5)' },
];

function Group({ title, children }: { title: string; children: ReactNode }) {
  return (
    <fieldset className="grid gap-5">
      <legend className="mb-5 w-full border-b-2 border-ink pb-1 font-cond text-22 font-semibold">{title}</legend>
      {children}
    </fieldset>
  );
}

const textOf = ({ register, says }: Fields) => (name: keyof SchoolInput) => ({ ...register(name), id: name, error: says(name) });
const figureOf = ({ register, says }: Fields) => (name: keyof SchoolInput) => ({ ...register(name, { valueAsNumber: true }), id: name, error: says(name), type: 'number', inputMode: 'decimal' as const, step: 'any' });

export function PlaceFields({ zones, ...fields }: Fields & { zones: readonly string[] }) {
  const text = textOf(fields);
  return (
    <Group title="The school">
      <TextInput label="Name" {...text('name')} />
      <TextInput label="Exam office" optional help="Room and hours, as on the plate at the door." {...text('office')} />
      <TextInput label="Help" optional help="Where questions go: an address or a telephone number." {...text('helpAddress')} />
      <Select label="Time zone" help="All appointments are in it, with its name written out." options={zones.map((zone) => ({ value: zone, label: zone.replaceAll('_', ' ') }))} {...text('zone')} />
      <Select label="Language and figures" help="The decimal mark on papers and reports. Answers are read with either." options={locales} {...text('locale')} />
    </Group>
  );
}

export function ExamFields(fields: Fields) {
  const figure = figureOf(fields);
  const { register, says } = fields;
  return (
    <Group title="Exams">
      <RadioGroup
        label="A number without its unit"
        options={[
          { value: 'read', label: 'Is read in the unit asked for' },
          { value: 'lose', label: 'Loses the unit marks, once a question' },
        ]}
        error={says('unitMissing')}
        {...register('unitMissing')}
      />
      <div className="grid gap-5 sm:grid-cols-2">
        <TextInput label="Pass mark" unit="%" help="A new exam begins with it." {...figure('passPercent')} />
        <TextInput label="Least in each section" unit="%" help="0 where sections have no minimum." {...figure('sectionPercent')} />
        <TextInput label="Decimals of a total" help="0, 1 or 2, as shown; an exam states its own rounding." {...figure('totalDecimals')} />
        <TextInput label="Answers after the end" help="Kept so long, for a person to decide." unit="seconds" {...figure('graceSeconds')} />
        <TextInput label="Candidates to a proctor" help="More than that is pointed out." {...figure('candidatesPerProctor')} />
      </div>
      <TextArea label="Declaration" help="What a candidate agrees to on the cover page." rows={4} error={says('declaration')} {...register('declaration')} id="declaration" />
    </Group>
  );
}

export function DocumentFields(fields: Fields) {
  const text = textOf(fields);
  return (
    <Group title="E-mail">
      <TextInput label="Sender's name" optional help="The school's name when left empty." {...text('senderName')} />
      <TextInput label="Sender's address" optional help="It must be one that your mail server may send from." {...text('senderAddress')} />
      <Checkbox label="Grade reports may be sent as PDF" help="Otherwise e-mail carries a link behind sign-in. Marks never stand in subject or text." {...fields.register('attachReports')} />
    </Group>
  );
}

export function LinkFields(fields: Fields) {
  const figure = figureOf(fields);
  return (
    <Group title="Ways in">
      <div className="grid gap-5 sm:grid-cols-3">
        <TextInput label="Invitations last" unit="days" {...figure('invitationDays')} />
        <TextInput label="Reset links last" unit="hours" {...figure('resetHours')} />
        <TextInput label="Slips last" unit="hours" {...figure('slipHours')} />
      </div>
    </Group>
  );
}
