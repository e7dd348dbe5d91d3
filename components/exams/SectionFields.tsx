'use client';

import { useState } from 'react';
import { useFieldArray } from 'react-hook-form';
import { Button } from '@/components/ui/Button';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import type { VersionFacts } from '@/lib/exams/model';
import { asNumberOrNull, useSheet } from './fields';
import { TemplateLine } from './TemplateLine';
import { TemplatePicker } from './TemplatePicker';

type Props = {
  index: number;
  /** Number of the section's first question on the paper. */
  first: number;
  /** Versions that stand on the exam or may be chosen. */
  versions: ReadonlyMap<string, VersionFacts>;
  areas: Readonly<Record<string, string>>;
  locked: boolean;
  onMove: (by: -1 | 1 | 'out') => void;
};

/** One section: its head, its questions in order, and the way to add more. */
export function SectionFields({ index, first, versions, areas, locked, onMove }: Props) {
  const { register, control, getValues, formState: { errors } } = useSheet();
  const items = useFieldArray({ control, name: `content.sections.${index}.items` });
  const [picking, setPicking] = useState(false);
  const wrong = errors.content?.sections?.[index];
  const chosen = () => new Set(getValues('content.sections').flatMap((section) => section.items.map((item) => item.templateId)));
  const path = `content.sections.${index}` as const;
  return (
    <fieldset className="sheet sheet--pad mt-4 min-w-0">
      <legend className="vh">Section {index + 1}</legend>
      <div className="grid gap-4 sm:grid-cols-[minmax(0,1fr)_16rem]">
        <TextInput label={`Title of section ${index + 1}`} optional error={wrong?.title?.message} {...register(`${path}.title`)} id={`${path}.title`} />
        <TextInput
          label="Least share for a pass" optional unit="%" inputMode="decimal" error={wrong?.leastPercent?.message}
          {...register(`${path}.leastPercent`, asNumberOrNull)} id={`${path}.leastPercent`}
        />
      </div>
      <div className="mt-4">
        <TextArea label="Instructions for this section" optional rows={2} className="min-h-16" error={wrong?.instructions?.message} {...register(`${path}.instructions`)} id={`${path}.instructions`} />
      </div>
      <ol className="mt-4 border-t border-ink" aria-label={`Questions of section ${index + 1}`}>
        {items.fields.map((item, place) => (
          <TemplateLine
            key={item.id} number={first + place} version={versions.get(item.versionId)} areas={areas} locked={locked}
            ends={{ first: place === 0, last: place === items.fields.length - 1 }}
            onDo={(what) => {
              if (what === 'out') items.remove(place);
              else if (what === 'up' || what === 'down') items.move(place, place + (what === 'up' ? -1 : 1));
              else items.update(place, { templateId: item.templateId, versionId: what.versionId });
            }}
          />
        ))}
        {items.fields.length === 0 && <li className="border-b border-rule py-3 text-15 text-ink-soft">No question yet.</li>}
      </ol>
      {!locked && (
        <div className="btn-row mt-4">
          <Button size="touch" onClick={() => setPicking(true)}>Choose templates</Button>
          <span className="grow" />
          <Button look="quiet" size="touch" disabled={index === 0} onClick={() => onMove(-1)}>Section up</Button>
          <Button look="quiet" size="touch" onClick={() => onMove(1)}>Section down</Button>
          <Button look="quiet" size="touch" onClick={() => onMove('out')}>Take the section out</Button>
        </div>
      )}
      <TemplatePicker
        open={picking} onClose={() => setPicking(false)} versions={versions} areas={areas} taken={picking ? chosen() : new Set()}
        onTake={(taken) => items.append(taken.map((version) => ({ templateId: version.templateId, versionId: version.versionId })))}
      />
    </fieldset>
  );
}
