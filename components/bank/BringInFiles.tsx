'use client';

import Link from 'next/link';
import { useActionState } from 'react';
import { Button } from '@/components/ui/Button';
import { Field } from '@/components/ui/Field';
import { Notice } from '@/components/ui/Notice';
import { Sign } from '@/components/ui/Sign';
import type { FileOutcome } from '@/lib/bank/model';
import type { Result } from '@/lib/result';

type State = Result<FileOutcome[]> | null;
const marks = {
  new: { shape: 'check', tone: 'ok', word: 'new' },
  changed: { shape: 'sq-half', tone: 'info', word: 'new draft' },
  same: { shape: 'sq', tone: 'none', word: 'nothing new' },
  refused: { shape: 'cross', tone: 'stop', word: 'not taken' },
} as const;

function Outcomes({ outcomes }: { outcomes: readonly FileOutcome[] }) {
  return (
    <table className="ledger" aria-label="What became of each file">
      <thead>
        <tr><th scope="col">File</th><th scope="col">Outcome</th><th scope="col">Why</th></tr>
      </thead>
      <tbody>
        {outcomes.map(({ name, outcome, slug, says }, place) => (
          <tr key={place}>
            <th scope="row">{slug && outcome !== 'refused' ? <Link href={`/bank/${slug}`}>{name}</Link> : name}</th>
            <td data-head="Outcome"><Sign shape={marks[outcome].shape} tone={marks[outcome].tone}>{marks[outcome].word}</Sign></td>
            <td data-head="Why">{says}</td>
          </tr>
        ))}
      </tbody>
    </table>
  );
}

/** Takes template files and says of each what became of it. Works before any script is there. */
export function BringInFiles({ bringIn }: { bringIn: (before: State, form: FormData) => Promise<Result<FileOutcome[]>> }) {
  const [result, act, busy] = useActionState<State, FormData>(bringIn, null);
  return (
    <div className="grid gap-6">
      <form action={act} className="grid max-w-measure gap-5">
        <Field label="Template files" help="YAML files, one template each. A known slug gets a new draft; its approved version stays in use." error={result && !result.ok ? result.says : undefined}>
          {(control) => <input {...control} className="input" type="file" name="files" multiple required accept=".yaml,.yml,text/yaml,application/yaml" />}
        </Field>
        <div className="btn-row">
          <Button type="submit" look="main" busy={busy}>Bring in</Button>
        </div>
      </form>
      {result?.ok && (
        <>
          <Notice kind="info" live>{result.value.length === 1 ? 'One file was read.' : `${result.value.length} files were read.`}</Notice>
          <Outcomes outcomes={result.value} />
        </>
      )}
    </div>
  );
}
