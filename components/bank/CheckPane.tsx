'use client';

import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { Button } from '@/components/ui/Button';
import { Notice } from '@/components/ui/Notice';
import { Progress } from '@/components/ui/Progress';
import { SelectBox } from '@/components/ui/Select';
import { bankKeys, type CheckWire, fetchCheck } from '@/lib/bank/client';
import { type CheckInput, drawChoices, isUnderWay } from '@/lib/bank/model';
import type { Result } from '@/lib/result';
import { Findings, ProblemGroups } from './Findings';
import { isUnread, isWhole, problemsIn } from './findings';

export type CheckActions = { start: (input: CheckInput) => Promise<Result<{ checkId: string }>>; cancel: (input: { id: string }) => Promise<Result<unknown>> };
type First = Omit<CheckWire, 'askedAt'> | null;
type CheckPaneProps = { templateId: string; first: First; changed: boolean; save: () => Promise<boolean>; actions: CheckActions; onSeed: (seed: string) => void };

/** The check shown: the page's first one, then whichever was started here, polled while it is under way. */
function useCheck(first: First, started: string | null) {
  const id = started ?? first?.id ?? null;
  const { data } = useQuery({
    queryKey: bankKeys.check(id ?? ''),
    queryFn: ({ signal }) => fetchCheck(id ?? '', signal),
    enabled: id !== null,
    initialData: first !== null && id === first.id ? { ...first, askedAt: '' } : undefined,
    refetchInterval: ({ state }) => (state.data && isUnderWay(state.data.state) ? 500 : false),
  });
  return data ?? null;
}

function Summary({ check, changed }: { check: CheckWire; changed: boolean }) {
  const count = problemsIn(check.report).length;
  if (check.state === 'failed') return <Notice kind="stop" live title="The check did not end.">{check.says}</Notice>;
  if (check.state === 'cancelled') return <Notice kind="info" live title="Cancelled.">{check.says || 'The check was ended before all draws were made.'}</Notice>;
  if (changed || !check.current) return <Notice kind="info" title="Of an older text.">The text changed since this check: check it again.</Notice>;
  if (check.state === 'in order') return <Notice kind="ok" live title="In order.">No problem in {check.draws.toLocaleString('en')} draws.</Notice>;
  return <Notice kind="wait" live title={count === 1 ? 'One problem stops the review.' : `${count} problems stop the review.`}>Mend the text, or give a reason in it where the language admits one.</Notice>;
}

/** Starts, shows and cancels the check of a template. Checking stores the text first. */
export function CheckPane({ templateId, first, changed, save, actions, onSeed }: CheckPaneProps) {
  const [started, setStarted] = useState<string | null>(null);
  const [draws, setDraws] = useState<CheckInput['draws']>(2_000);
  const [busy, setBusy] = useState(false);
  const [says, setSays] = useState('');
  const check = useCheck(first, started);
  const underWay = check !== null && isUnderWay(check.state);
  const run = async (work: () => Promise<Result<unknown>>) => {
    setBusy(true);
    const result = await work().catch(() => null);
    setBusy(false);
    setSays(result?.ok ? '' : (result?.says ?? 'The server did not answer. Try again in a moment.'));
  };
  const start = () => run(async () => {
    if (!(await save())) return { ok: false, code: 'not-stored', says: 'The text could not be stored, so it was not checked: see beneath the text.' };
    const result = await actions.start({ id: templateId, draws });
    if (result.ok) setStarted(result.value.checkId);
    return result;
  });
  return (
    <div className="grid grid-cols-[minmax(0,1fr)] gap-5">
      <div className="flex flex-wrap items-center gap-2">
        <SelectBox
          aria-label="Draws to make" value={String(draws)} onChange={(event) => setDraws(drawChoices.find((choice) => String(choice) === event.target.value) ?? 2_000)}
          options={drawChoices.map((choice) => ({ value: String(choice), label: `${choice.toLocaleString('en')} draws` }))}
        />
        <Button look="main" busy={busy || underWay} onClick={() => void start()}>{check ? 'Check again' : 'Check'}</Button>
      </div>
      {says && <Notice kind="stop" live>{says}</Notice>}
      {check && underWay && (
        <Progress
          label={check.state === 'queued' ? 'The check waits for its turn' : 'Checking'} done={check.done} of={check.draws} unit="draws"
          says="It goes on when you leave this page." cancel={<Button size="dense" look="quiet" onClick={() => void run(() => actions.cancel({ id: check.id }))}>Cancel</Button>}
        />
      )}
      {check && !underWay && <Summary check={check} changed={changed} />}
      {check && !underWay && isWhole(check.report) && <Findings report={check.report} onSeed={onSeed} />}
      {check && !underWay && isUnread(check.report) && <ProblemGroups problems={check.report.problems} draws={check.draws} onSeed={onSeed} />}
      {!check && <p className="text-15 text-ink-soft">Not checked yet. A check draws the stored text thousands of times and says where a key, a tolerance or a misstep goes wrong.</p>}
    </div>
  );
}
