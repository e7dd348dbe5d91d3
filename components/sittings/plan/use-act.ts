'use client';

import { useRouter } from 'next/navigation';
import { useState } from 'react';
import type { Result } from '@/lib/result';

export type Said = { kind: 'ok' | 'stop'; text: string };

/** Runs a server action from a button: one at a time, what comes of it in words, and the page read again. */
export function useAct() {
  const router = useRouter();
  const [busy, setBusy] = useState(false);
  const [said, setSaid] = useState<Said | null>(null);
  async function act<Value>(work: () => Promise<Result<Value>>, says: (value: Value) => string): Promise<boolean> {
    setBusy(true);
    setSaid(null);
    const result = await work().catch(() => null);
    setBusy(false);
    setSaid(result?.ok ? { kind: 'ok', text: says(result.value) } : { kind: 'stop', text: result?.says ?? 'The server did not answer. Try again in a moment.' });
    if (result?.ok) router.refresh();
    return result?.ok === true;
  }
  return { act, busy, said };
}
