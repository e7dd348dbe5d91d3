'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { TextArea } from '@/components/ui/TextArea';
import { TextInput } from '@/components/ui/TextInput';
import type { Result } from '@/lib/result';
import { type OverrideInput, overrideInput, type PartMark } from '@/lib/results/model';

type Props = { candidateId: string; mark: Pick<PartMark, 'question' | 'part' | 'issue' | 'awarded' | 'of'>; override: (input: OverrideInput) => Promise<Result<null>> };

function Fields({ candidateId, mark, override, onDone }: Props & { onDone: () => void }) {
  const { question, part, issue, awarded } = mark;
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({
    schema: overrideInput, values: { candidateId, question, part, issue, awarded, reason: '' }, send: override, onDone,
  });
  return (
    <form className="fields mt-4" noValidate onSubmit={(event) => void submit(event)}>
      <ErrorSummary errors={troubles} attempt={attempt} />
      <TextInput label="Marks" unit={`of ${mark.of}`} inputMode="decimal" error={says('awarded')} {...form.register('awarded', { setValueAs: (text: string | number) => (typeof text === 'number' ? text : text.trim() === '' ? NaN : Number(text.replace(',', '.'))) })} />
      <TextArea label="Reason" help="It stands in the record, and other staff see it." rows={3} maxLength={500} error={says('reason')} {...form.register('reason')} />
      <div className="dialog__do"><Button type="submit" look="main" busy={busy}>Change the marks</Button></div>
    </form>
  );
}

/** Gives a part other marks, with the reason. */
export function OverrideForm(props: Props) {
  const [open, setOpen] = useState(false);
  const router = useRouter();
  const { question, part } = props.mark;
  return (
    <>
      <Button size="dense" className="mt-3" aria-label={`Change the marks of question ${question} part ${part}`} onClick={() => setOpen(true)}>Change the marks</Button>
      <Dialog open={open} onClose={() => setOpen(false)} title={`Marks of question ${question} part ${part}`}>
        <Fields {...props} onDone={() => { setOpen(false); router.refresh(); }} />
      </Dialog>
    </>
  );
}
