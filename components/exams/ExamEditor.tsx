'use client';

import { zodResolver } from '@hookform/resolvers/zod';
import { type ReactNode, useMemo, useState } from 'react';
import { FormProvider, useFieldArray, useForm } from 'react-hook-form';
import { Button } from '@/components/ui/Button';
import { ErrorSummary } from '@/components/ui/ErrorSummary';
import { FormGuard } from '@/components/ui/FormGuard';
import { LinkButton } from '@/components/ui/LinkButton';
import { Notice } from '@/components/ui/Notice';
import { type ExamContent, examSheet, type ExamSheet, type ExamState, type VersionFacts } from '@/lib/exams/model';
import { examProblems, sumsOf } from '@/lib/exams/sums';
import type { Result } from '@/lib/result';
import { BlueprintFields } from './BlueprintFields';
import { CoverFields } from './CoverFields';
import { type SheetFields, useSheet } from './fields';
import { MarkingFields } from './MarkingFields';
import { type ReviewActions, ReviewPanel } from './ReviewPanel';
import { MaterialFields, RuleFields } from './RuleFields';
import { SectionFields } from './SectionFields';
import { SumsPanel } from './SumsPanel';
import { troublesOf } from './troubles';

type Exam = { id: string; title: string; state: ExamState; revision: number; content: ExamContent; reviewNote: string; reviewAskedBy: string | null; mayDecide: boolean };
type Props = {
  exam: Exam;
  /** Versions on the exam and those that may be chosen. */
  versions: readonly VersionFacts[];
  areas: Readonly<Record<string, string>>;
  save: (input: { examId: string; sheet: ExamSheet }) => Promise<Result<{ revision: number; state: ExamState }>>;
  review: ReviewActions;
  /** What stands beside the sheet under the review: the forms. */
  children: ReactNode;
};
type Facts = ReadonlyMap<string, VersionFacts>;

function Sections({ versions, areas, locked }: { versions: Facts; areas: Props['areas']; locked: boolean }) {
  const { control, watch } = useSheet();
  const sections = useFieldArray({ control, name: 'content.sections' });
  const counts = watch('content.sections').map((section) => section.items.length);
  return (
    <section className="section" aria-labelledby="sections-head">
      <h2 id="sections-head">Sections and questions</h2>
      {sections.fields.map((field, index) => (
        <SectionFields
          key={field.id} index={index} versions={versions} areas={areas} locked={locked}
          first={1 + counts.slice(0, index).reduce((sum, count) => sum + count, 0)}
          onMove={(by) => {
            if (by === 'out') sections.remove(index);
            else if (index + by >= 0 && index + by < sections.fields.length) sections.move(index, index + by);
          }}
        />
      ))}
      {!locked && (
        <div className="btn-row mt-4">
          <Button size="touch" onClick={() => sections.append({ title: '', instructions: '', leastPercent: null, items: [] })}>Add a section</Button>
        </div>
      )}
    </section>
  );
}

/** The sums of what the fields hold now, whether it is valid or not. */
function useSums(versions: Facts, areas: Props['areas']) {
  const { watch } = useSheet();
  const content = watch('content');
  const minutes = Number.isFinite(content.minutes) ? content.minutes : 0;
  const parsed = examSheet.shape.content.safeParse({ ...content, minutes });
  const sums = sumsOf(content, versions);
  return { sums, minutes, sections: content.sections.map((section) => section.title), problems: parsed.success ? examProblems(parsed.data, versions, areas) : [], valid: parsed.success };
}

function Beside({ exam, facts, unsaved, review, children }: { exam: Exam; facts: { versions: Facts; areas: Props['areas'] }; unsaved: boolean; review: ReviewActions; children: ReactNode }) {
  const { sums, minutes, sections, problems, valid } = useSums(facts.versions, facts.areas);
  return (
    <aside aria-label="Sums, review and forms" className="xl:sticky xl:top-4 xl:max-h-[calc(100vh-2rem)] xl:overflow-y-auto xl:pr-1">
      <SumsPanel sums={sums} minutes={minutes} sections={sections} problems={problems} />
      <ReviewPanel exam={exam} unsaved={unsaved} stopped={!valid || problems.some((problem) => problem.stops)} actions={review} />
      {children}
    </aside>
  );
}

function Blueprint({ versions, areas, locked }: { versions: Facts; areas: Props['areas']; locked: boolean }) {
  const { sums } = useSums(versions, areas);
  return <BlueprintFields coverage={sums.coverage} areas={areas} locked={locked} />;
}

function useSaving(exam: Exam, save: Props['save']) {
  const [revision, setRevision] = useState(exam.revision);
  const [says, setSays] = useState<{ kind: 'ok' | 'stop'; text: string } | null>(null);
  const form = useForm<SheetFields, unknown, ExamSheet>({ resolver: zodResolver(examSheet), shouldFocusError: false, defaultValues: { title: exam.title, revision: exam.revision, content: exam.content } });
  const submit = form.handleSubmit(async (sheet) => {
    setSays(null);
    const result = await save({ examId: exam.id, sheet: { ...sheet, revision } }).catch(() => null);
    if (!result?.ok) return setSays({ kind: 'stop', text: result?.says ?? 'The server did not answer. What you typed is still here: try again in a moment.' });
    setRevision(result.value.revision);
    form.reset({ ...sheet, revision: result.value.revision });
    setSays({ kind: 'ok', text: 'Saved.' });
  }, () => setSays(null));
  return { form, submit, says, revision };
}

/** The exam as one sheet: what is written on it at the left, what it adds up to and its review at the right. */
export function ExamEditor({ exam, versions, areas, save, review, children }: Props) {
  const { form, submit, says, revision } = useSaving(exam, save);
  const facts = useMemo(() => new Map(versions.map((version) => [version.versionId, version])), [versions]);
  const { errors, submitCount, isSubmitting, isDirty } = form.formState;
  const locked = exam.state === 'in review' || exam.state === 'retired';
  return (
    <FormProvider {...form}>
      <FormGuard dirty={isDirty && !isSubmitting} />
      <div className="beside">
        <form onSubmit={submit} noValidate className="min-w-0">
          <ErrorSummary errors={troublesOf(errors, '')} attempt={submitCount} />
          <fieldset disabled={locked} className="min-w-0 border-0 p-0">
            <legend className="vh">The exam</legend>
            <CoverFields />
            <Sections versions={facts} areas={areas} locked={locked} />
            <Blueprint versions={facts} areas={areas} locked={locked} />
            <RuleFields />
            <MaterialFields />
            <MarkingFields />
          </fieldset>
          <div className="sticky bottom-0 mt-8 flex flex-wrap items-center gap-3 border-t border-rule bg-paper py-3">
            {!locked && <Button type="submit" look="main" busy={isSubmitting}>Save</Button>}
            <LinkButton href={`/exams/${exam.id}/paper?seed=1`}>See a paper</LinkButton>
            <span className="text-15 text-ink-soft" role="status">{isDirty ? 'Not saved yet' : says?.kind === 'ok' ? says.text : ''}</span>
          </div>
          {says?.kind === 'stop' && <Notice kind="stop" live>{says.text}</Notice>}
        </form>
        <Beside exam={{ ...exam, revision }} facts={{ versions: facts, areas }} unsaved={isDirty} review={review}>{children}</Beside>
      </div>
    </FormProvider>
  );
}
