import { refuse, type Refusal } from '@/lib/result';
import type { TemplateState } from './model';

/** `edit` is a text that differs from the stored one; `ask`, `take-back`, `approve` and `return` belong to a review. */
export type TemplateEvent = 'edit' | 'ask' | 'take-back' | 'approve' | 'return' | 'retire';
/** `inUse`: an approved version stands that exams may choose, whatever happens to the working text. */
export type TemplateNow = { state: TemplateState; inUse: boolean };
export type TemplateRefusal = Refusal<'in-review' | 'retired' | 'not-a-draft' | 'not-in-review' | 'not-approved'>;

const inReview = (): TemplateRefusal =>
  refuse('in-review', 'The template is in review, so its text stands still. Take it back from review, or wait until the reviewer returns it.');
const retired = (): TemplateRefusal => refuse('retired', 'The template is retired. Start a new template from its text.');

/** The next state of a template, or why there is none. Draft → in review → approved → retired; in review → draft; an edit of an approved one is a draft. */
export function nextState(now: TemplateNow, event: TemplateEvent): { ok: true; state: TemplateState } | TemplateRefusal {
  const { state } = now;
  if (state === 'retired') return retired();
  switch (event) {
    case 'edit':
      return state === 'in review' ? inReview() : { ok: true, state: 'draft' };
    case 'ask':
      if (state === 'in review') return inReview();
      return state === 'draft' ? { ok: true, state: 'in review' } : refuse('not-a-draft', 'This text is approved already: change it before you ask for a review.');
    case 'take-back':
    case 'return':
      return state === 'in review' ? { ok: true, state: 'draft' } : notInReview();
    case 'approve':
      return state === 'in review' ? { ok: true, state: 'approved' } : notInReview();
    case 'retire':
      if (state === 'in review') return inReview();
      return state === 'approved' || now.inUse ? { ok: true, state: 'retired' } : refuse('not-approved', 'Only an approved template can be retired.');
  }
}

const notInReview = (): TemplateRefusal => refuse('not-in-review', 'The template is not in review any more: load the page again to see what happened.');
