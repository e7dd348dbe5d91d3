import { randomUUID } from 'node:crypto';
import { libraryDigests, loadLibrary } from '@/lib/bank/library';
import type { Database } from '@/db/client';
import type { Context } from '@/lib/context';
import { approveExam, askForReview, newExam, saveExam } from '@/lib/exams/commands';
import { type ExamContent, emptyExam } from '@/lib/exams/model';
import type { Result } from '@/lib/result';
import { schoolSettings } from '@/lib/school/model';

export function valueOf<Value>(result: Result<Value>): Value {
  if (!result.ok) throw new Error(`${result.code}: ${result.says}`);
  return result.value;
}

/** Two givens with many values, so that two draws are seldom alike. */
export const templateText = (slug: string): string => `template: ${slug}
language: 1
title: Current in a resistance (${slug})
area: dc-motors
level: 2
minutes: 5
cautions: [live-test]
given:
  V: { label: Supply voltage, unit: V, range: [100, 600], step: 1 }
  R: { label: Load resistance, unit: ohm, range: [8, 60], step: 0.1 }
stem: |
  A resistance of {{R}} is connected to a {{V}} supply.
parts:
  - part: a
    kind: number
    ask: Find the current.
    key: V / R
    unit: A
    marks: 2
  - part: b
    kind: number
    ask: Find the power.
    key: V * part.a
    unit: W
    marks: 1
solution: |
  $I = V / R = {{part.a}}$
`;

export type Version = { templateId: string; versionId: string };

/** A template with one version, as the bank stores it after a review. */
export async function makeVersion(owner: Database, author: string, options: { verdict?: 'approved' | 'returned' | null; decider: string; text?: string }): Promise<Version> {
  const slug = `t-${randomUUID()}`;
  const text = options.text ?? templateText(slug);
  const facts = { title: `Current in a resistance (${slug})`, area: 'dc-motors', level: 2, minutes: 5, marks: 3, kinds: ['number', 'number'] };
  const digests = libraryDigests(loadLibrary());
  const template = await owner.insertInto('template').values({ slug, state: 'approved', text, ...facts, owner_id: author }).returning('id').executeTakeFirstOrThrow();
  const version = await owner
    .insertInto('template_version')
    .values({ template_id: template.id, number: 1, text, digests: JSON.stringify({ 'area:dc-motors': digests['area:dc-motors'], 'caution:live-test': digests['caution:live-test'] }), engine: 'fullfield-1', ...facts, author_id: author, writers: [author] })
    .returning('id')
    .executeTakeFirstOrThrow();
  const verdict = options.verdict === undefined ? 'approved' : options.verdict;
  await owner.insertInto('template_review').values({ version_id: version.id, asked_by: author, verdict, ...(verdict ? { decided_by: options.decider, decided_at: new Date() } : {}) }).execute();
  return { templateId: template.id, versionId: version.id };
}

/** Content of an exam of 120 minutes with one section of these versions. */
export function contentOf(versions: readonly Version[], change: Partial<ExamContent> = {}): ExamContent {
  const empty = emptyExam(schoolSettings.parse({}));
  return { ...empty, minutes: 120, sections: [{ title: 'Machines', instructions: '', leastPercent: null, items: versions.map(({ templateId, versionId }) => ({ templateId, versionId })) }], ...change };
}

/** An exam written by `writer` and approved by `second`: its form. */
export async function makeForm(writer: Context, second: Context, versions: readonly Version[]): Promise<{ examId: string; formId: string }> {
  const { examId } = valueOf(await newExam(writer, { title: 'Direct-current machines' }));
  const { revision } = valueOf(await saveExam(writer, examId, { title: 'Direct-current machines', revision: 1, content: contentOf(versions) }));
  valueOf(await askForReview(writer, examId, revision));
  return { examId, formId: valueOf(await approveExam(second, examId, { revision, note: '' })).formId };
}
