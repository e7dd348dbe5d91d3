'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { DocumentFields, ExamFields, LinkFields, PlaceFields } from '@/components/school/SchoolFields';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { FormGuard } from '@/components/ui/FormGuard';
import { Notice } from '@/components/ui/Notice';
import type { Result } from '@/lib/result';
import { schoolForm, type SchoolInput } from '@/lib/school/model';

type Props = { values: SchoolInput; zones: readonly string[]; save: (input: SchoolInput) => Promise<Result<{ version: number }>> };

/** Everything a school decides once, on one page. */
export function SchoolForm({ values, zones, save }: Props) {
  const [saved, setSaved] = useState(false);
  const { form, submit, troubles, says, attempt, busy, dirty } = useSchemaForm({
    schema: schoolForm,
    values,
    send: save,
    onDone: ({ version }, fields) => {
      form.reset({ ...fields, version });
      setSaved(true);
    },
  });
  const fields = { register: form.register, says };
  return (
    <form onSubmit={submit} noValidate className="grid max-w-measure gap-10">
      <FormGuard dirty={dirty && !busy} />
      <ErrorSummary errors={troubles} attempt={attempt} />
      <PlaceFields {...fields} zones={zones} />
      <ExamFields {...fields} />
      <DocumentFields {...fields} />
      <LinkFields {...fields} />
      {saved && !dirty && (
        <Notice kind="ok" live>
          <p>The settings are saved. They hold from now on; what was frozen before keeps its own.</p>
        </Notice>
      )}
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy} disabled={!dirty}>
          Save the settings
        </Button>
      </div>
    </form>
  );
}
