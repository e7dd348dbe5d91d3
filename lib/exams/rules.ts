import { refuse, type Result } from '@/lib/result';
import type { ExamState } from './model';

export type ExamEvent =
  | { kind: 'edit' }
  | { kind: 'ask for review' }
  | { kind: 'return' }
  /** `by` decides; whoever asked for the review or wrote on it since the last approval is no second instructor. */
  | { kind: 'approve'; by: string; askedBy: string | null; writers: readonly string[] }
  | { kind: 'retire' };

export type ExamCode = 'state' | 'second-instructor';

const allowed: Record<ExamEvent['kind'], readonly ExamState[]> = {
  edit: ['draft', 'approved'],
  'ask for review': ['draft'],
  return: ['in review'],
  approve: ['in review'],
  retire: ['approved'],
};
const next: Record<ExamEvent['kind'], ExamState> = {
  // An approved exam that is written on becomes the draft of its next form; the forms it gave stay as they are.
  edit: 'draft',
  'ask for review': 'in review',
  return: 'draft',
  approve: 'approved',
  retire: 'retired',
};
const says: Record<ExamEvent['kind'], string> = {
  edit: 'It is not open for changes: an exam in review is returned first, a retired one stays as it is.',
  'ask for review': 'Only a draft can be sent for review.',
  return: 'Only an exam in review can be returned.',
  approve: 'Only an exam in review can be approved.',
  retire: 'Only an approved exam can be retired.',
};

/** Next state of an exam after an event, or why not. */
export function nextExamState(state: ExamState, event: ExamEvent): Result<ExamState, ExamCode> {
  if (!allowed[event.kind].includes(state)) return refuse('state', says[event.kind]);
  if (event.kind === 'approve' && (event.by === event.askedBy || event.writers.includes(event.by))) {
    return refuse('second-instructor', 'An exam is approved by a second instructor: not one who wrote on it or asked for the review.');
  }
  return { ok: true, value: next[event.kind] };
}
