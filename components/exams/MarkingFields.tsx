import { useController } from 'react-hook-form';
import { RadioGroup } from '@/components/ui/RadioGroup';
import { TextInput } from '@/components/ui/TextInput';
import { asNumber, type SheetFields, useSheet } from './fields';

type ShareName = 'content.marking.carriedShare' | 'content.marking.wrongOptionCosts' | 'content.marking.tolerances.relative' | 'content.marking.tolerances.closer';

const tidy = (share: number): string => String(Math.round(share * 1e6) / 1e4);

/** A share kept as 0 to 1 and written in per cent. */
function ShareInput({ name, label, help }: { name: ShareName; label: string; help?: string }) {
  const { control } = useSheet();
  const { field: { ref, value, onChange, onBlur }, fieldState } = useController<SheetFields, ShareName>({ control, name });
  return (
    <TextInput
      label={label} help={help} unit="%" inputMode="decimal" id={name} name={name} ref={ref} error={fieldState.error?.message}
      defaultValue={tidy(value ?? 0)} onBlur={onBlur}
      onChange={(event) => onChange(event.target.value.trim() === '' ? Number.NaN : Number(event.target.value.replace(',', '.')) / 100)}
    />
  );
}

/** How the exam marks: units, values carried on, wrong options, default tolerances. */
export function MarkingFields() {
  const { register, formState: { errors } } = useSheet();
  const wrong = errors.content?.marking;
  const units = [
    { value: 'read', label: 'read in the unit asked for' },
    { value: 'lose', label: 'read, and loses the unit mark' },
  ];
  return (
    <section className="section" aria-labelledby="marking-head">
      <h2 id="marking-head">Marking</h2>
      <div className="grid max-w-measure gap-5">
        <RadioGroup label="An answer without a unit is" options={units} {...register('content.marking.unitMissing')} />
        <TextInput label="A unit mistake costs" help="Once a question." unit="marks" inputMode="decimal" error={wrong?.unitMistakeCosts?.message} {...register('content.marking.unitMistakeCosts', asNumber)} id="content.marking.unitMistakeCosts" />
        <ShareInput name="content.marking.carriedShare" label="A value rightly carried on from an earlier slip earns" help="Of the part's marks." />
        <ShareInput name="content.marking.wrongOptionCosts" label="A wrong option takes away" help="Of the part's marks; 0 unless candidates are told otherwise on the cover page." />
      </div>
      <details className="mt-5">
        <summary className="cursor-pointer text-15 font-medium">Tolerances of parts that state none</summary>
        <div className="mt-4 grid max-w-measure gap-5 sm:grid-cols-2">
          <ShareInput name="content.marking.tolerances.relative" label="Numbers" />
          <ShareInput name="content.marking.tolerances.closer" label="Where four figures are asked" />
          <TextInput label="Parts in per cent" unit="points" inputMode="decimal" error={wrong?.tolerances?.percentPoints?.message} {...register('content.marking.tolerances.percentPoints', asNumber)} id="content.marking.tolerances.percentPoints" />
          <TextInput label="Angles" unit="degrees" inputMode="decimal" error={wrong?.tolerances?.degrees?.message} {...register('content.marking.tolerances.degrees', asNumber)} id="content.marking.tolerances.degrees" />
        </div>
      </details>
    </section>
  );
}
