import { Checkbox } from '@/components/ui/Checkbox';
import { RadioGroup } from '@/components/ui/RadioGroup';
import { Select } from '@/components/ui/Select';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import { locales, roundings, roundingSays } from '@/lib/exams/model';
import { asNumber, useSheet } from './fields';
import { MarkdownPreview } from './MarkdownPreview';

const localeSays = (locale: string): string => {
  const name = new Intl.DisplayNames('en', { type: 'language' }).of(locale) ?? locale;
  return `${name}: ${new Intl.NumberFormat(locale).format(0.5)}`;
};

/** Time allowed, pass rule and where numbers are read. */
export function RuleFields() {
  const { register, formState: { errors } } = useSheet();
  const wrong = errors.content;
  return (
    <section className="section" aria-labelledby="rule-head">
      <h2 id="rule-head">Time and pass rule</h2>
      <div className="grid max-w-measure gap-5">
        <TextInput label="Time allowed" unit="minutes" inputMode="numeric" error={wrong?.minutes?.message} {...register('content.minutes', asNumber)} id="content.minutes" />
        <TextInput label="Least share of all marks for a pass" unit="%" inputMode="decimal" error={wrong?.passRule?.overallPercent?.message} {...register('content.passRule.overallPercent', asNumber)} id="content.passRule.overallPercent" />
        <RadioGroup label="Before it is compared, the total is" options={roundings.map((value) => ({ value, label: roundingSays[value] }))} {...register('content.passRule.rounding')} />
        <Select label="Numbers are printed and read as in" help="Decides the decimal mark on papers and in answers." options={locales.map((value) => ({ value, label: localeSays(value) }))} {...register('content.locale')} id="content.locale" />
      </div>
    </section>
  );
}

const calculators = [
  { value: 'none', label: 'No calculator' },
  { value: 'non-programmable', label: 'A non-programmable calculator' },
  { value: 'any', label: 'Any calculator' },
];

/** What may lie on the bench, and the formula sheet. */
export function MaterialFields() {
  const { register, watch, formState: { errors } } = useSheet();
  return (
    <section className="section" aria-labelledby="material-head">
      <h2 id="material-head">Materials allowed</h2>
      <div className="grid max-w-measure gap-5">
        <RadioGroup label="Calculator" options={calculators} {...register('content.materials.calculator')} />
        <div>
          <Checkbox label="Electrical code book" {...register('content.materials.codeBook')} />
          <Checkbox label="Formula sheet of this exam" {...register('content.materials.formulaSheet')} />
        </div>
        <TextArea label="Anything else" optional rows={2} help="One thing a line." error={errors.content?.materials?.other?.message} {...register('content.materials.other')} id="content.materials.other" />
        {watch('content.materials.formulaSheet') && (
          <>
            <TextArea label="Formula sheet" rows={8} className="input--mono" help="Markdown; formulas between dollar signs: $E = V - I_a R_a$." error={errors.content?.formulaSheet?.message} {...register('content.formulaSheet')} id="content.formulaSheet" />
            <MarkdownPreview label="The formula sheet as printed" text={watch('content.formulaSheet')} />
          </>
        )}
      </div>
    </section>
  );
}
