'use client';

import Link from 'next/link';
import { PasswordField } from '@/components/auth/PasswordField';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { LinkButton } from '@/components/ui/LinkButton';
import { TextInput } from '@/components/ui/TextInput';
import { leaveFor, signInByPassword } from '@/lib/auth/client';
import { signInSchema } from '@/lib/auth/model';
import { done, refuse } from '@/lib/result';

/** `next`: the page to go to once signed in. `office`: where the exam office is, when the school says so. */
export function SignInForm({ next, office }: { next: string; office: string }) {
  const { form, submit, troubles, says, attempt, busy } = useSchemaForm({
    schema: signInSchema,
    values: { identifier: '', password: '' },
    send: async (fields) => {
      const refused = await signInByPassword(fields);
      return refused === null ? done(null) : refuse('refused', refused);
    },
    onDone: () => leaveFor(next),
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-5" aria-labelledby="sign-in-title">
      <h2 id="sign-in-title" className="text-28">
        Sign in
      </h2>
      <ErrorSummary errors={troubles} attempt={attempt} title="You are not signed in" />
      <TextInput label="E-mail or learner number" tall autoComplete="username" autoCapitalize="none" spellCheck={false} error={says('identifier')} {...form.register('identifier')} id="identifier" />
      <PasswordField
        label="Password"
        tall
        autoComplete="current-password"
        error={says('password')}
        help={
          <>
            Forgotten? <Link href="/reset">Have a link sent</Link>
            {office ? `, or ask the exam office: ${office}.` : ', or ask the exam office.'}
          </>
        }
        {...form.register('password')}
        id="password"
      />
      <Button type="submit" look="main" size="exam" busy={busy}>
        Sign in
      </Button>
      <p className="flex items-center gap-3 text-13 text-ink-soft before:h-px before:flex-1 before:bg-rule after:h-px after:flex-1 after:bg-rule">or, on the day of a sitting</p>
      <LinkButton href="/slip" size="exam">
        Use the code on my slip
      </LinkButton>
    </form>
  );
}
