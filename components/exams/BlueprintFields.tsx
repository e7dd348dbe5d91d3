'use client';

import { useFieldArray } from 'react-hook-form';
import { Button } from '@/components/ui/Button';
import { Sign } from '@/components/ui/Sign';
import { Select } from '@/components/ui/Select';
import { TextInput } from '@/components/ui/TextInput';
import type { Coverage } from '@/lib/exams/sums';
import { asNumber, useSheet } from './fields';

type Props = { coverage: readonly Coverage[]; areas: Readonly<Record<string, string>>; locked: boolean };

function Standing({ row }: { row: Coverage | undefined }) {
  const marks = row?.marks ?? 0;
  const difference = marks - (row?.wanted ?? marks);
  if (difference === 0) return <Sign shape="check" tone="ok" small>{marks} there</Sign>;
  return <Sign shape="sq-bang" tone="wait" small>{marks} there, {difference > 0 ? `${difference} over` : `${-difference} short`}</Sign>;
}

/** Marks wanted per area and level, beside what stands on the exam. */
export function BlueprintFields({ coverage, areas, locked }: Props) {
  const { register, control, watch, formState: { errors } } = useSheet();
  const rows = useFieldArray({ control, name: 'content.blueprint' });
  const wanted = watch('content.blueprint');
  const of = (area: string, level: number) => coverage.find((row) => row.area === area && row.level === level);
  const extra = coverage.filter((row) => row.wanted === null);
  return (
    <section className="section" aria-labelledby="blueprint-head">
      <h2 id="blueprint-head">Blueprint</h2>
      <ul className="border-t border-ink">
        {rows.fields.map((field, index) => {
          const now = wanted[index] ?? field;
          const wrong = errors.content?.blueprint?.[index];
          const path = `content.blueprint.${index}` as const;
          return (
            <li key={field.id} className="grid items-end gap-3 border-b border-rule py-3 sm:grid-cols-[minmax(0,1fr)_5rem_6rem_9rem_auto]">
              <Select label="Area" options={Object.entries(areas).map(([value, label]) => ({ value, label }))} {...register(`${path}.area`)} id={`${path}.area`} error={wrong?.area?.message} />
              <TextInput label="Level" inputMode="numeric" {...register(`${path}.level`, asNumber)} id={`${path}.level`} error={wrong?.level?.message} />
              <TextInput label="Marks" inputMode="decimal" {...register(`${path}.marks`, asNumber)} id={`${path}.marks`} error={wrong?.marks?.message} />
              <span className="flex min-h-10 items-center"><Standing row={of(now.area, now.level)} /></span>
              {!locked && <Button look="quiet" aria-label={`Take out row ${index + 1} of the blueprint`} onClick={() => rows.remove(index)}>Take out</Button>}
            </li>
          );
        })}
        {extra.map((row) => (
          <li key={`${row.area} ${row.level}`} className="flex flex-wrap items-center gap-3 border-b border-rule py-2">
            <span className="flex-1">{areas[row.area] ?? row.area}, level {row.level}</span>
            <span className="text-15 text-ink-soft">{row.marks} marks there, nothing stated</span>
            {!locked && <Button size="dense" onClick={() => rows.append({ area: row.area, level: row.level, marks: row.marks })}>Want these {row.marks}</Button>}
          </li>
        ))}
        {rows.fields.length === 0 && extra.length === 0 && <li className="border-b border-rule py-3 text-15 text-ink-soft">State the marks wanted per area and level; what is chosen is counted against it.</li>}
      </ul>
      {!locked && (
        <div className="btn-row mt-3">
          <Button size="touch" onClick={() => rows.append({ area: Object.keys(areas)[0] ?? '', level: 1, marks: 0 })}>Add a row</Button>
        </div>
      )}
    </section>
  );
}
