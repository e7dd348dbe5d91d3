'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { ParticularsFields } from '@/components/people/PersonFields';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { FormGuard } from '@/components/ui/FormGuard';
import { Notice } from '@/components/ui/Notice';
import { type Particulars, particularsSchema } from '@/lib/people/model';
import type { Result } from '@/lib/result';

type Props = { values: Particulars; save: (input: Particulars) => Promise<Result<null>> };

/** Changes who somebody is. */
export function ParticularsForm({ values, save }: Props) {
  const [saved, setSaved] = useState(false);
  const { form, submit, troubles, says, attempt, busy, dirty } = useSchemaForm({
    schema: particularsSchema,
    values,
    send: save,
    onDone: (_, fields) => {
      form.reset(fields);
      setSaved(true);
    },
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <FormGuard dirty={dirty && !busy} />
      <ErrorSummary errors={troubles} attempt={attempt} />
      <ParticularsFields<Particulars> register={form.register} says={says} />
      {saved && !dirty && (
        <Notice kind="ok" live>
          <p>The particulars are saved.</p>
        </Notice>
      )}
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy} disabled={!dirty}>
          Save the particulars
        </Button>
      </div>
    </form>
  );
}
