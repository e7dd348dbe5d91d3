'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { LinkButton } from '@/components/ui/LinkButton';
import { Notice } from '@/components/ui/Notice';
import { TextInput } from '@/components/ui/TextInput';
import { type ResetRequestInput, resetRequestSchema } from '@/lib/auth/model';
import type { Result } from '@/lib/result';

/** Asks for a link; the answer is the same for everybody. */
export function ResetRequestForm({ ask }: { ask: (input: ResetRequestInput) => Promise<Result<null>> }) {
  const [asked, setAsked] = useState(false);
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({ schema: resetRequestSchema, values: { identifier: '' }, send: ask, onDone: () => setAsked(true) });
  if (asked)
    return (
      <div className="grid gap-5">
        <Notice kind="info" live>
          <p>If there is an account with an address for this, a link is on its way. It works once and for a short time. Look among unwanted mail too.</p>
          <p>No e-mail? The exam office prints slips with a code.</p>
        </Notice>
        <LinkButton href="/sign-in" size="exam">
          Go to sign in
        </LinkButton>
      </div>
    );
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} />
      <TextInput label="E-mail or learner number" tall autoComplete="username" autoCapitalize="none" spellCheck={false} error={says('identifier')} {...form.register('identifier')} id="identifier" />
      <Button type="submit" look="main" size="exam" busy={busy}>
        Send me a link
      </Button>
      <LinkButton href="/sign-in" size="exam">
        Go back
      </LinkButton>
    </form>
  );
}
