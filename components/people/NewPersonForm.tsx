'use client';

import { useRouter } from 'next/navigation';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { ParticularsFields, RolesFields } from '@/components/people/PersonFields';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { FormGuard } from '@/components/ui/FormGuard';
import { LinkButton } from '@/components/ui/LinkButton';
import { type PersonInput, personSchema } from '@/lib/people/model';
import type { Result } from '@/lib/result';

type Props = { add: (input: PersonInput) => Promise<Result<{ id: string; sent: boolean }>> };

/** Adds one person and goes to the person's page. */
export function NewPersonForm({ add }: Props) {
  const router = useRouter();
  const values: PersonInput = { name: '', sortName: '', email: '', learnerNumber: '', roles: ['student'] };
  const { form, submit, troubles, says, attempt, busy, dirty } = useSchemaForm({
    schema: personSchema,
    values,
    send: add,
    onDone: ({ id }, fields) => {
      form.reset(fields);
      router.push(`/people/${id}`);
    },
  });
  return (
    <form onSubmit={submit} noValidate className="grid max-w-measure gap-5">
      <FormGuard dirty={dirty && !busy} />
      <ErrorSummary errors={troubles} attempt={attempt} />
      <ParticularsFields<PersonInput> register={form.register} says={says} />
      <RolesFields<PersonInput> register={form.register} says={says} />
      <p className="text-15 text-ink-soft">Somebody with an e-mail is sent an invitation to choose a password.</p>
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>
          Add the person
        </Button>
        <LinkButton href="/people">Go back</LinkButton>
      </div>
    </form>
  );
}
