'use client';

import { useState, useTransition } from 'react';
import { Button } from '@/components/ui/Button';
import type { ButtonLook } from '@/components/ui/button-class';
import { type ConfirmQuestion, useConfirm } from '@/components/ui/Confirm';
import { Notice } from '@/components/ui/Notice';
import type { Result } from '@/lib/result';

type Props = {
  label: string;
  run: () => Promise<Result<unknown>>;
  /** Said when it was done; nothing where the page itself shows it. */
  done?: string;
  look?: ButtonLook;
  confirm?: ConfirmQuestion;
  dense?: boolean;
};

/** One thing to do, with what came of it beneath. */
export function ActionButton({ label, run, done, look, confirm, dense }: Props) {
  const [ask, question] = useConfirm();
  const [busy, start] = useTransition();
  const [outcome, setOutcome] = useState<{ ok: boolean; says: string } | null>(null);
  const act = async () => {
    if (confirm && !(await ask(confirm))) return;
    setOutcome(null);
    start(async () => {
      const result = await run().catch(() => null);
      if (result?.ok) setOutcome(done ? { ok: true, says: done } : null);
      else setOutcome({ ok: false, says: result?.says ?? 'The server did not answer. Try again in a moment.' });
    });
  };
  return (
    <span className="inline-grid gap-2">
      <Button look={look} size={dense ? 'dense' : 'control'} busy={busy} onClick={() => void act()}>
        {label}
      </Button>
      {outcome && (
        <Notice kind={outcome.ok ? 'ok' : 'stop'} live>
          <p>{outcome.says}</p>
        </Notice>
      )}
      {question}
    </span>
  );
}
