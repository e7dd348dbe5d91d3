'use client';

import { keepPreviousData, useQuery } from '@tanstack/react-query';
import Link from 'next/link';
import { useActionState, useMemo, useState, type ReactNode } from 'react';
import { Button } from '@/components/ui/Button';
import { FormGuard } from '@/components/ui/FormGuard';
import { StateMark } from '@/components/ui/StateMark';
import { bankKeys, fetchPreview } from '@/lib/bank/client';
import type { TemplateShown } from '@/lib/bank/views';
import type { Result } from '@/lib/result';
import { type CheckActions, CheckPane } from './CheckPane';
import { DrawPane, type Look } from './DrawPane';
import { type ReviewActions, ReviewPane } from './ReviewPane';
import { TextPane } from './TextPane';
import { type Bench, type SaveAction, useBench, useSettled } from './use-bench';
import { VersionList } from './VersionList';

export type BenchActions = { save: SaveAction; saveForm: (before: Result<unknown> | null, form: FormData) => Promise<Result<unknown>>; check: CheckActions; review: ReviewActions };
type TemplateBenchProps = { template: TemplateShown; areaTitle: string; locale: string; actions: BenchActions };

/** Draws the text as typed once it has been still for a moment; the last draw stays until the next is there. */
function useLook(text: string, seed: string): Look {
  const settled = useSettled(text, 400);
  const { data, error, isFetching } = useQuery({
    queryKey: bankKeys.preview(settled, seed), queryFn: ({ signal }) => fetchPreview(settled, seed, signal), placeholderData: keepPreviousData, retry: false, staleTime: 60_000,
  });
  return { preview: data, error: error?.message ?? '', drawing: isFetching || settled !== text };
}

const words = { stored: 'stored', changed: 'changes not stored', storing: 'storing…', refused: 'not stored', overtaken: 'not stored' } as const;

function Head({ template, areaTitle, bench, readOnly, title }: { template: TemplateShown; areaTitle: string; bench: Bench; readOnly: boolean; title: string }) {
  const facts = [areaTitle, template.level === null ? '' : `level ${template.level}`, template.versions[0] ? `version ${template.versions[0].number}` : 'no version yet'];
  const stored = bench.standing.kind === 'stored' ? `stored ${template.changedAt}${template.changedBy ? ` by ${template.changedBy}` : ''}` : words[bench.standing.kind];
  return (
    <div className="page__head">
      <div>
        <Link className="page__back" href="/bank">Bank</Link>
        <h1>{title}</h1>
        <div className="mt-1 flex flex-wrap items-center gap-x-4 text-15 text-ink-soft">
          <span>{facts.filter(Boolean).join(' · ')}</span>
          <StateMark thing="template" state={bench.state} />
          <span role="status">{stored}</span>
        </div>
      </div>
      {!readOnly && (
        <div className="btn-row">
          <Button type="submit" form="template-text" busy={bench.standing.kind === 'storing'}>Save</Button>
        </div>
      )}
    </div>
  );
}

function Pane({ title, name, children, flush }: { title: string; name: string; children: ReactNode; flush?: boolean }) {
  return (
    <section className="flex min-w-0 flex-col border border-rule bg-sheet xl:h-[calc(100dvh-11rem)] xl:min-h-[36rem]" aria-labelledby={`pane-${name}`}>
      <h2 id={`pane-${name}`} className="border-b border-rule px-4 py-3 font-cond text-13 font-medium uppercase tracking-wider text-ink-soft">{title}</h2>
      {flush ? <div className="flex min-h-0 flex-1 flex-col">{children}</div> : <div className="min-h-0 flex-1 overflow-auto p-4" tabIndex={0} role="group" aria-labelledby={`pane-${name}`}>{children}</div>}
    </section>
  );
}

/** A template on the bench: its text, a live draw of it, its check, review and versions. Stacked on a narrow screen. */
export function TemplateBench({ template, areaTitle, locale, actions }: TemplateBenchProps) {
  const bench = useBench(template, actions.save);
  const [seed, setSeed] = useState('check-0');
  const [answer, plainSave] = useActionState(actions.saveForm, null);
  const look = useLook(bench.text, seed);
  const problems = useMemo(() => look.preview?.problems ?? [], [look.preview]);
  const readOnly = bench.state === 'in review' || bench.state === 'retired';
  const changed = bench.standing.kind !== 'stored';
  return (
    <>
      <FormGuard dirty={changed} />
      <Head template={template} areaTitle={areaTitle} bench={bench} readOnly={readOnly} title={look.preview?.facts?.title ?? template.title} />
      {answer && !answer.ok && <p className="error">{answer.says}</p>}
      <div className="grid gap-4 md:grid-cols-[minmax(0,3fr)_minmax(0,2fr)] xl:grid-cols-[minmax(0,31rem)_minmax(0,1fr)_minmax(0,24rem)]">
        <form id="template-text" action={plainSave} className="min-w-0 md:col-span-2 xl:col-span-1" onSubmit={(event) => (event.preventDefault(), void bench.save())}>
          <input type="hidden" name="id" value={template.id} />
          <input type="hidden" name="revision" value={bench.revision} />
          <Pane title={readOnly ? 'Text, standing still' : 'Text'} name="text" flush>
            <TextPane bench={bench} problems={problems} readOnly={readOnly} />
          </Pane>
        </form>
        <Pane title="Draw" name="draw">
          <DrawPane look={look} seed={seed} onSeed={setSeed} locale={locale} />
        </Pane>
        <Pane title="Check" name="check">
          <CheckPane templateId={template.id} first={template.check} changed={changed} save={bench.save} actions={actions.check} onSeed={setSeed} />
        </Pane>
      </div>
      <div className="mt-6 grid gap-6 md:grid-cols-2">
        <section className="sheet sheet--pad" aria-labelledby="review-title">
          <h2 id="review-title" className="mb-3 text-18">Review</h2>
          <ReviewPane template={template} state={bench.state} revision={bench.revision} actions={actions.review} />
        </section>
        <section className="sheet sheet--pad" aria-labelledby="versions-title">
          <h2 id="versions-title" className="mb-1 text-18">Versions</h2>
          <VersionList versions={template.versions} onUse={readOnly ? undefined : bench.setText} />
        </section>
      </div>
    </>
  );
}
