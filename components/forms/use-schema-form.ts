'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { useCallback, useState } from 'react';
import { type DefaultValues, type FieldPath, type FieldValues, get, useForm } from 'react-hook-form';
import type { z } from 'zod';
import type { FieldTrouble } from '@/components/ui/ErrorSummary';
import type { Refusal, Result } from '@/lib/result';

const unreachable: Refusal = { ok: false, code: 'unreachable', says: 'The server did not answer. What you typed is still here: try again in a moment.' };

type Wanted<Fields extends FieldValues, Value> = {
  /** The schema the server checks with. It reads what the fields hold as it is (no transforms). */
  schema: z.ZodType<Fields, Fields>;
  values: DefaultValues<Fields>;
  send: (fields: Fields) => Promise<Result<Value>>;
  onDone: (value: Value, fields: Fields) => void;
};

function messagesIn(errors: unknown, path: string): FieldTrouble[] {
  if (typeof errors !== 'object' || errors === null) return [];
  if ('message' in errors && typeof errors.message === 'string') return [{ field: path, says: errors.message }];
  return Object.entries(errors).flatMap(([key, inner]) => (key === 'ref' ? [] : messagesIn(inner, path ? `${path}.${key}` : key)));
}

/**
 * A form of react-hook-form over one zod schema: checked in the browser, sent, and what the server refuses shown like the browser's own
 * findings, with everything typed kept. `troubles` is for the ErrorSummary, `says(field)` stands beside the field.
 */
export function useSchemaForm<Fields extends FieldValues, Value>({ schema, values, send, onDone }: Wanted<Fields, Value>) {
  const form = useForm<Fields, unknown, Fields>({ resolver: zodResolver(schema), defaultValues: values });
  const [refused, setRefused] = useState<Refusal | null>(null);
  const { errors, submitCount, isSubmitting, isDirty } = form.formState;
  const submit = form.handleSubmit(
    async (fields) => {
      setRefused(null);
      const result = await send(fields).catch(() => unreachable);
      if (result.ok) onDone(result.value, fields);
      else setRefused(result);
    },
    () => setRefused(null),
  );
  const found = messagesIn(errors, '');
  const troubles: FieldTrouble[] = refused ? [...found, { field: refused.field, says: refused.says }] : found;
  const says = useCallback(
    (field: FieldPath<Fields>): string | undefined => {
      const own: unknown = get(errors, field);
      const message = typeof own === 'object' && own !== null && 'message' in own && typeof own.message === 'string' ? own.message : undefined;
      return message ?? (refused?.field === field ? refused.says : undefined);
    },
    [errors, refused],
  );
  return { form, submit, troubles, says, attempt: submitCount, busy: isSubmitting, dirty: isDirty };
}
