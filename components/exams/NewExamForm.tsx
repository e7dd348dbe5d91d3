'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useRouter } from 'next/navigation';
import { useState } from 'react';
import { useForm } from 'react-hook-form';
import { z } from 'zod';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { TextInput } from '@/components/ui/TextInput';
import { examTitle } from '@/lib/exams/model';
import type { Result } from '@/lib/result';

const fields = z.object({ title: examTitle });
type Fields = z.infer<typeof fields>;

/** The button for a new exam, and the sheet that asks for its title. */
export function NewExamForm({ make }: { make: (input: Fields) => Promise<Result<{ examId: string }>> }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [refused, setRefused] = useState<string | null>(null);
  const form = useForm<Fields>({ resolver: zodResolver(fields), defaultValues: { title: '' } });
  const { errors, isSubmitting } = form.formState;
  const submit = form.handleSubmit(async (input) => {
    const result = await make(input).catch(() => null);
    if (result?.ok) router.push(`/exams/${result.value.examId}`);
    else setRefused(result?.says ?? 'The server did not answer. What you typed is still here: try again in a moment.');
  });
  return (
    <>
      <Button look="main" onClick={() => setOpen(true)}>New exam</Button>
      <Dialog open={open} onClose={() => setOpen(false)} title="New exam">
        <form onSubmit={submit} noValidate className="grid gap-5">
          <TextInput label="Title" help="As it stands on the paper and the grade report." error={errors.title?.message ?? refused ?? undefined} {...form.register('title')} id="title" />
          <div className="btn-row">
            <Button type="submit" look="main" busy={isSubmitting}>Begin the exam</Button>
          </div>
        </form>
      </Dialog>
    </>
  );
}
