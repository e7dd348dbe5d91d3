'use client';

import { useState } from 'react';
import { PasswordField } from '@/components/auth/PasswordField';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { Notice } from '@/components/ui/Notice';
import { type ChangePasswordInput, changePasswordSchema, passwordLength } from '@/lib/auth/model';
import type { Result } from '@/lib/result';

type Props = { identifier: string; hasPassword: boolean; change: (input: ChangePasswordInput) => Promise<Result<null>> };

/** Changes one's own password; somebody who came in by a slip sets the first. */
export function ChangePasswordForm({ identifier, hasPassword, change }: Props) {
  const [changed, setChanged] = useState(false);
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({
    schema: changePasswordSchema,
    values: { current: '', password: '' },
    send: change,
    onDone: () => {
      form.reset();
      setChanged(true);
    },
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5">
      <ErrorSummary errors={troubles} attempt={attempt} title="The password is not changed" />
      <input type="text" name="username" autoComplete="username" value={identifier} readOnly hidden />
      {hasPassword && <PasswordField label="Present password" autoComplete="current-password" error={says('current')} {...form.register('current')} id="current" />}
      <PasswordField label="New password" autoComplete="new-password" help={`At least ${passwordLength.least} characters. A few unrelated words do well.`} error={says('password')} {...form.register('password')} id="password" />
      {changed && (
        <Notice kind="ok" live>
          <p>The password is changed. Every other device is signed out.</p>
        </Notice>
      )}
      <div className="btn-row">
        <Button type="submit" look="main" busy={busy}>
          {hasPassword ? 'Change the password' : 'Set a password'}
        </Button>
      </div>
    </form>
  );
}
