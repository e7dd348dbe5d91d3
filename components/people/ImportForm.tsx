'use client';

import { useRouter } from 'next/navigation';
import { type FormEvent, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Checkbox } from '@/components/ui/Checkbox';
import { ErrorSummary, type FieldTrouble } from '@/components/ui/ErrorSummary';
import { Field } from '@/components/ui/Field';
import { Select } from '@/components/ui/Select';
import type { Result } from '@/lib/result';
import { rosterLimits } from '@/lib/rosters/model';

type Props = { terms: readonly { id: string; name: string }[]; preview: (form: FormData) => Promise<Result<{ id: string }>> };

/** What can be said of a file before it is sent. */
function troubleOf(file: FormDataEntryValue | null): string | null {
  if (!(file instanceof File) || file.size === 0) return 'Choose a file that holds something.';
  return file.size > rosterLimits.bytes ? `The file is larger than ${rosterLimits.bytes / 1000} kB. Split it, or leave out columns.` : null;
}

/** Chooses a roster and what to do with it. Nothing is taken in until its preview was seen. */
export function ImportForm({ terms, preview }: Props) {
  const router = useRouter();
  const [troubles, setTroubles] = useState<FieldTrouble[]>([]);
  const [attempt, setAttempt] = useState(0);
  const [busy, setBusy] = useState(false);
  // Sent by hand and not through the form's action, which would empty the fields on a refusal.
  const submit = async (event: FormEvent<HTMLFormElement>) => {
    event.preventDefault();
    const form = new FormData(event.currentTarget);
    const trouble = troubleOf(form.get('file'));
    setAttempt(attempt + 1);
    if (trouble) return setTroubles([{ field: 'file', says: trouble }]);
    setBusy(true);
    const read = await preview(form).catch(() => null);
    setBusy(false);
    if (read?.ok) return router.push(`/people/import/${read.value.id}`);
    setTroubles([{ field: read?.field ?? 'file', says: read?.says ?? 'The server did not answer. Try again in a moment.' }]);
  };
  return (
    <form onSubmit={(event) => void submit(event)} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} />
      <Field id="file" label="File" help={`CSV from a spreadsheet, with headings in the first line. Up to ${rosterLimits.rows.toLocaleString('en')} rows.`} error={troubles.find((one) => one.field === 'file')?.says}>
        {(control) => <input {...control} type="file" name="file" accept=".csv,.tsv,.txt,text/csv,text/plain" className="input h-auto py-2" />}
      </Field>
      <Select label="Term of the classes" name="termId" id="termId" options={terms.map((term) => ({ value: term.id, label: term.name }))} />
      <div>
        <Checkbox label="Make classes that the term does not have" name="makeClasses" />
        <Checkbox label="Send invitations to new people with an e-mail" name="invite" defaultChecked />
      </div>
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>
          Read the file
        </Button>
      </div>
    </form>
  );
}
