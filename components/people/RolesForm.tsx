'use client';

import { useState } from 'react';
import { useSchemaForm } from '@/components/forms/use-schema-form';
import { RolesFields } from '@/components/people/PersonFields';
import { Button } from '@/components/ui/Button';
import { useConfirm } from '@/components/ui/Confirm';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { Notice } from '@/components/ui/Notice';
import type { Role } from '@/lib/context';
import { rolesSchema } from '@/lib/people/model';
import { refuse, type Result } from '@/lib/result';

type Props = { name: string; held: Role[]; save: (roles: Role[]) => Promise<Result<null>> };

/** Changes what roles somebody holds; asks first, because it signs them out. */
export function RolesForm({ name, held, save }: Props) {
  const [ask, question] = useConfirm();
  const [saved, setSaved] = useState(false);
  const { form, submit, troubles, says, attempt, busy, dirty } = useSchemaForm({
    schema: rolesSchema,
    values: { roles: held },
    send: async ({ roles }) => {
      const sure = await ask({ title: `Change the roles of ${name}?`, says: `${name} is signed out on every device at once, in a sitting too, and signs in again with the new roles.`, verb: 'Change the roles' });
      return sure ? save(roles) : refuse('kept', 'The roles were not changed.');
    },
    onDone: (_, fields) => {
      form.reset(fields);
      setSaved(true);
    },
  });
  return (
    <form onSubmit={submit} noValidate className="grid gap-4">
      <ErrorSummary errors={troubles} attempt={attempt} />
      <RolesFields<{ roles: Role[] }> register={form.register} says={says} />
      {saved && !dirty && (
        <Notice kind="ok" live>
          <p>The roles are changed.</p>
        </Notice>
      )}
      <div className="btn-row">
        <Button type="submit" busy={busy} disabled={!dirty}>
          Change the roles
        </Button>
      </div>
      {question}
    </form>
  );
}
