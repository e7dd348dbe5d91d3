'use client';

import { useSchemaForm } from '@/components/forms/use-schema-form';
import { PasswordField } from '@/components/auth/PasswordField';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { leaveFor } from '@/lib/auth/client';
import { passwordLength, type RedeemInput, redeemSchema } from '@/lib/auth/model';
import type { Result } from '@/lib/result';

type Props = { token: string; identifier: string; choose: (input: RedeemInput) => Promise<Result<null>> };

/** Chooses the password that an invitation or reset link asks for. `identifier` tells a password keeper whose it is. */
export function NewPasswordForm({ token, identifier, choose }: Props) {
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({
    schema: redeemSchema,
    values: { token, password: '' },
    send: choose,
    onDone: () => leaveFor('/sign-in?done=password'),
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} title="The password is not set" />
      <input type="text" name="username" autoComplete="username" value={identifier} readOnly hidden />
      <PasswordField
        label="New password"
        tall
        autoComplete="new-password"
        help={`At least ${passwordLength.least} characters. A few unrelated words do well.`}
        error={says('password')}
        {...form.register('password')}
        id="password"
      />
      <Button type="submit" look="main" size="exam" busy={busy}>
        Set the password
      </Button>
    </form>
  );
}
