'use client';

import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { LinkButton } from '@/components/ui/LinkButton';
import { TextInput } from '@/components/ui/TextInput';
import { leaveFor, signInBySlip } from '@/lib/auth/client';
import { slipSchema } from '@/lib/auth/model';
import { done, refuse } from '@/lib/result';

/** Signing in by the one-time code of a printed slip. */
export function SlipForm() {
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({
    schema: slipSchema,
    values: { learnerNumber: '', code: '' },
    send: async (fields) => {
      const refused = await signInBySlip(fields);
      return refused === null ? done(null) : refuse('refused', refused);
    },
    onDone: () => leaveFor('/'),
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} title="You are not signed in" />
      <TextInput label="Learner number" tall autoComplete="username" spellCheck={false} error={says('learnerNumber')} {...form.register('learnerNumber')} id="learnerNumber" />
      <TextInput
        label="Code"
        help="Twelve letters and figures. Capitals and hyphens do not matter. A code works once."
        tall
        autoComplete="one-time-code"
        spellCheck={false}
        className="font-mono uppercase"
        error={says('code')}
        {...form.register('code')}
        id="code"
      />
      <Button type="submit" look="main" size="exam" busy={busy}>
        Sign in
      </Button>
      <LinkButton href="/sign-in" size="exam">
        Use a password instead
      </LinkButton>
    </form>
  );
}
