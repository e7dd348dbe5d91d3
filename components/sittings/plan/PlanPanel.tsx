'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Dialog } from '@/components/ui/Dialog';
import { Notice } from '@/components/ui/Notice';
import { Shape } from '@/components/ui/Shape';
import { TextArea } from '@/components/ui/TextArea';
import type { Readiness } from '@/lib/planning/rules';
import type { Result } from '@/lib/result';
import { PapersProgress } from './PapersProgress';
import { useAct } from './use-act';

export type PlanActions = {
  invite: (input: { sittingId: string }) => Promise<Result<{ queued: number; before: number; withoutAddress: number }>>;
  drawAgain: (input: { sittingId: string }) => Promise<Result<null>>;
  renewNeeds: (input: { sittingId: string }) => Promise<Result<null>>;
  add: (input: { sittingId: string; accounts: string[] }) => Promise<Result<{ added: number }>>;
  cancel: (input: { sittingId: string; reason: string }) => Promise<Result<null>>;
};
type Plan = {
  id: string;
  title: string;
  papers: 'none' | 'drawing' | 'drawn' | 'failed';
  drawn: number;
  candidates: number;
  withoutAddress: number;
  readiness: readonly Readiness[];
  missing: readonly { accountId: string; name: string }[];
  changedNeeds: number;
  mayPlan: boolean;
  /** Whether it can still be called off by the reader. */
  mayCancel: boolean;
};

function ReadyLines({ lines }: { lines: readonly Readiness[] }) {
  return (
    <ul>
      {lines.map((line) => (
        <li key={line.code} className="flex items-baseline gap-2 border-b border-rule py-2 text-15">
          <span className={line.ready ? 'text-enamel' : 'text-brass'}><Shape name={line.ready ? 'check' : 'sq-bang'} /></span>
          <span><span className="vh">{line.ready ? 'Ready: ' : 'Missing: '}</span>{line.says}</span>
        </li>
      ))}
    </ul>
  );
}

const people = (count: number): string => (count === 1 ? '1 candidate' : `${count} candidates`);
const invited = (value: { queued: number; before: number; withoutAddress: number }): string => {
  const rest = value.before > 0 ? ` ${people(value.before)} had this plan already.` : '';
  return `${value.queued === 1 ? '1 invitation' : `${value.queued} invitations`} queued.${rest}${value.withoutAddress > 0 ? ` ${people(value.withoutAddress)} without an address: a registrar or proctor prints slips for them.` : ''}`;
};

function CancelDialog({ plan, cancel }: { plan: Plan; cancel: PlanActions['cancel'] }) {
  const [open, setOpen] = useState(false);
  const [reason, setReason] = useState('');
  const { act, busy, said } = useAct();
  return (
    <>
      <Button look="stop" onClick={() => setOpen(true)}>Cancel the sitting</Button>
      <Dialog open={open} onClose={() => setOpen(false)} title={`Cancel “${plan.title}”?`}>
        <p className="dialog__text">It cannot be taken up again; plan another one instead. Candidates are not told by e-mail.</p>
        <div className="mt-4"><TextArea label="Reason" help="It stands in the record." rows={2} value={reason} maxLength={500} onChange={(event) => setReason(event.target.value)} error={said?.kind === 'stop' ? said.text : undefined} /></div>
        <div className="dialog__do">
          <Button onClick={() => setOpen(false)}>Keep it</Button>
          <Button look="stop-main" busy={busy} onClick={() => void act(() => cancel({ sittingId: plan.id, reason }), () => 'Cancelled.').then((done) => done && setOpen(false))}>Cancel the sitting</Button>
        </div>
      </Dialog>
    </>
  );
}

function Changes({ plan, actions, act, busy }: { plan: Plan; actions: PlanActions; act: ReturnType<typeof useAct>['act']; busy: boolean }) {
  const accounts = plan.missing.map((student) => student.accountId);
  return (
    <div className="mt-4 grid gap-3">
      {plan.missing.length > 0 && (
        <Notice kind="wait" title="Enrolled, not on the list:" action={<Button size="dense" busy={busy} onClick={() => void act(() => actions.add({ sittingId: plan.id, accounts }), (value) => `${people(value.added)} added.`)}>Add {plan.missing.length}</Button>}>
          {' '}{plan.missing.map((student) => student.name).join(', ')}
        </Notice>
      )}
      {plan.changedNeeds > 0 && (
        <Notice kind="wait" title="Accommodations changed" action={<Button size="dense" busy={busy} onClick={() => void act(() => actions.renewNeeds({ sittingId: plan.id }), () => 'Times and needs are those of the day now.')}>Take over</Button>}>
          {' '}for {people(plan.changedNeeds)} since the list was made.
        </Notice>
      )}
    </div>
  );
}

/** What of the plan is ready and what is missing, and what the planner may do about it. */
export function PlanPanel({ plan, actions }: { plan: Plan; actions: PlanActions }) {
  const { act, busy, said } = useAct();
  return (
    <section className="section--cap" aria-labelledby="ready-head">
      <h2 id="ready-head">Ready and missing</h2>
      <ReadyLines lines={plan.readiness} />
      {plan.papers === 'drawing' && <div className="mt-4"><PapersProgress key={plan.candidates} sittingId={plan.id} drawn={plan.drawn} of={plan.candidates} /></div>}
      {plan.mayPlan && <Changes plan={plan} actions={actions} act={act} busy={busy} />}
      {plan.mayPlan && (
        <div className="btn-row mt-4">
          {plan.papers === 'failed' && <Button busy={busy} onClick={() => void act(() => actions.drawAgain({ sittingId: plan.id }), () => 'Drawing again.')}>Draw the papers again</Button>}
          {plan.candidates > plan.withoutAddress && <Button busy={busy} onClick={() => void act(() => actions.invite({ sittingId: plan.id }), invited)}>Invite by e-mail</Button>}
        </div>
      )}
      {said && <div className="mt-3"><Notice kind={said.kind} live>{said.text}</Notice></div>}
      {plan.mayCancel && <div className="btn-row mt-4"><CancelDialog plan={plan} cancel={actions.cancel} /></div>}
    </section>
  );
}
