'use client';

import { useState } from 'react';
import { useAct } from '@/components/sittings/plan/use-act';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import { TextInput } from '@/components/ui/TextInput';
import type { ClaimInput } from '@/lib/results/model';
import type { Result } from '@/lib/result';

export type ClaimLine = { candidateId: string; name: string; question: number; part: string; sequence: number; answer: string; typed: string; received: string };
type Decide = (input: ClaimInput) => Promise<Result<null>>;

function Claim({ claim, decide }: { claim: ClaimLine; decide: Decide }) {
  const [reason, setReason] = useState('');
  const { act, busy, said } = useAct();
  const send = (decision: ClaimInput['decision']) =>
    act(() => decide({ candidateId: claim.candidateId, question: claim.question, part: claim.part, sequence: claim.sequence, decision, reason }), () => (decision === 'taken' ? 'Taken.' : 'Left out.'));
  return (
    <li className="border-b border-rule py-3">
      <p className="text-15"><b className="font-medium">{claim.name}</b>, question {claim.question} part {claim.part}: <span className="num break-words">{claim.answer || 'nothing'}</span></p>
      <p className="text-13 text-ink-soft">Came {claim.received}{claim.typed && `; the browser says it was typed ${claim.typed}`}</p>
      <div className="mt-2 flex flex-wrap items-end gap-2">
        <div className="min-w-60 flex-1"><TextInput label="Reason" value={reason} maxLength={500} onChange={(event) => setReason(event.target.value)} /></div>
        <Button busy={busy} onClick={() => void send('taken')}>Take it</Button>
        <Button busy={busy} look="stop" onClick={() => void send('left out')}>Leave it out</Button>
      </div>
      {said?.kind === 'stop' && <div className="mt-2"><Notice kind="stop" live>{said.text}</Notice></div>}
    </li>
  );
}

/** Answers that reached the server after the end: a person decides whether each counts. */
export function ClaimsPanel({ claims, decide }: { claims: readonly ClaimLine[]; decide: Decide }) {
  return (
    <section className="section section--cap" aria-labelledby="claims-head">
      <h2 id="claims-head">Came after the end</h2>
      <ul>{claims.map((claim) => <Claim key={`${claim.candidateId} ${claim.question} ${claim.part} ${claim.sequence}`} claim={claim} decide={decide} />)}</ul>
    </section>
  );
}
