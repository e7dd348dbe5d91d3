'use client';

import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { useConfirm } from '@/components/ui/Confirm';
import { Notice } from '@/components/ui/Notice';
import { StateMark } from '@/components/ui/StateMark';
import { TextArea } from '@/components/ui/TextArea';
import type { DecisionInput, ReviewInput, TemplateState } from '@/lib/bank/model';
import type { TemplateShown, VersionLine } from '@/lib/bank/views';
import type { Result } from '@/lib/result';

export type ReviewActions = {
  ask: (input: ReviewInput) => Promise<Result<unknown>>;
  decide: (input: DecisionInput) => Promise<Result<unknown>>;
  takeBack: (input: { id: string }) => Promise<Result<unknown>>;
  retire: (input: { id: string }) => Promise<Result<unknown>>;
};
type Run = (work: () => Promise<Result<unknown>>) => Promise<void>;

/** Runs an action once at a time and keeps what it refused. */
function useRun(): { run: Run; busy: boolean; says: string } {
  const [busy, setBusy] = useState(false);
  const [says, setSays] = useState('');
  const run: Run = async (work) => {
    setBusy(true);
    const result = await work().catch(() => null);
    setBusy(false);
    setSays(result?.ok ? '' : (result?.says ?? 'The server did not answer. Try again in a moment.'));
  };
  return { run, busy, says };
}

function Ask({ template, revision, run, busy, ask }: { template: TemplateShown; revision: number; run: Run; busy: boolean; ask: ReviewActions['ask'] }) {
  const [note, setNote] = useState('');
  return (
    <div className="grid gap-3">
      <p className="text-15">A second instructor reads the text, its draws and its check, then approves it or returns it. A check of exactly this text has to be in order.</p>
      <TextArea label="Note to the reviewer" optional rows={3} value={note} maxLength={2000} onChange={(event) => setNote(event.target.value)} />
      <div className="btn-row">
        <Button busy={busy} onClick={() => run(() => ask({ id: template.id, revision, note }))}>Ask for review</Button>
      </div>
    </div>
  );
}

function Decide({ version, run, busy, decide }: { version: VersionLine; run: Run; busy: boolean; decide: ReviewActions['decide'] }) {
  const [note, setNote] = useState('');
  const [missing, setMissing] = useState('');
  const give = (verdict: DecisionInput['verdict']) => {
    if (verdict === 'returned' && note.trim() === '') return setMissing('Say what has to change before you return it.');
    setMissing('');
    void run(() => decide({ versionId: version.id, verdict, note }));
  };
  return (
    <div className="grid gap-3">
      <p className="text-15">Version {version.number} waits for a decision. {version.askedBy} asked for it.</p>
      {version.askNote && <blockquote className="border-l-2 border-rule-strong pl-3 text-15">{version.askNote}</blockquote>}
      <TextArea label="Note" help="Needed when you return it; the author reads it." error={missing || undefined} rows={3} value={note} maxLength={2000} onChange={(event) => setNote(event.target.value)} />
      <div className="btn-row">
        <Button look="main" busy={busy} onClick={() => give('approved')}>Approve version {version.number}</Button>
        <Button busy={busy} onClick={() => give('returned')}>Return with the note</Button>
      </div>
    </div>
  );
}

function Waiting({ version, mayTakeBack, onTakeBack, busy }: { version: VersionLine; mayTakeBack: boolean; onTakeBack: () => void; busy: boolean }) {
  return (
    <div className="grid gap-3">
      <p className="text-15">Version {version.number} waits for a second instructor. Its text stands still until then.</p>
      {mayTakeBack && (
        <div className="btn-row">
          <Button busy={busy} onClick={onTakeBack}>Take back from review</Button>
        </div>
      )}
    </div>
  );
}

function Retire({ template, run, busy, retire }: { template: TemplateShown; run: Run; busy: boolean; retire: ReviewActions['retire'] }) {
  const [confirm, question] = useConfirm();
  const onRetire = async () => {
    const says = 'No new exam can choose it any more. Forms and papers that stand on it keep it.';
    if (await confirm({ title: `Retire “${template.title}”?`, says, verb: 'Retire', keep: 'Keep it' })) await run(() => retire({ id: template.id }));
  };
  return (
    <div className="mt-4 border-t border-rule pt-4">
      <Button look="stop" busy={busy} onClick={() => void onRetire()}>Retire the template</Button>
      {question}
    </div>
  );
}

/** What the review of a template asks of whoever looks at it. `state` and `revision` are those of the text in this browser. */
export function ReviewPane({ template, state, revision, actions }: { template: TemplateShown; state: TemplateState; revision: number; actions: ReviewActions }) {
  const { run, busy, says } = useRun();
  const waiting = template.versions.find((version) => version.verdict === null);
  const returned = state === 'draft' && template.versions[0]?.verdict === 'returned' ? template.versions[0] : undefined;
  return (
    <div className="grid gap-3">
      <p><StateMark thing="template" state={state} /></p>
      {says && <Notice kind="stop" live>{says}</Notice>}
      {returned && <Notice kind="wait" title={`Version ${returned.number} was returned by ${returned.decidedBy ?? 'the reviewer'}.`}>{returned.note}</Notice>}
      {template.inUse !== null && state !== 'approved' && <p className="text-15 text-ink-soft">Version {template.inUse} stays approved: exams use it until this text is approved.</p>}
      {state === 'draft' && <Ask template={template} revision={revision} run={run} busy={busy} ask={actions.ask} />}
      {state === 'in review' && waiting?.mayDecide && <Decide version={waiting} run={run} busy={busy} decide={actions.decide} />}
      {state === 'in review' && waiting && !waiting.mayDecide && (
        <Waiting version={waiting} mayTakeBack={template.mayTakeBack} busy={busy} onTakeBack={() => void run(() => actions.takeBack({ id: template.id }))} />
      )}
      {state === 'approved' && <p className="text-15">Exams can choose it. Change the text to begin a new draft; the approved version stays in use meanwhile.</p>}
      {state === 'retired' && <p className="text-15">No new exam can choose it.</p>}
      {(state === 'approved' || (state === 'draft' && template.inUse !== null)) && <Retire template={template} run={run} busy={busy} retire={actions.retire} />}
    </div>
  );
}
