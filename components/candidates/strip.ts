import type { StripQuestion } from '@/components/ui/QuestionStrip';
import { type OutboxView, placeOf } from '@/lib/candidates/outbox';
import type { Question } from '@/lib/templates/question';

/** How far one question is: answered parts of all its parts. */
export const answeredParts = (question: Question, number: number, answers: OutboxView['answers']): number =>
  question.parts.filter((part) => (answers.get(placeOf(number, part.part)) ?? '').trim() !== '').length;

/** The index of the sheet: what stands only on this device comes first, then the flag, then how much is answered. */
export function stripOf(questions: readonly Question[], outbox: OutboxView, flags: ReadonlySet<number>): StripQuestion[] {
  return questions.map((question, index) => {
    const number = index + 1;
    const done = answeredParts(question, number, outbox.answers);
    if (question.parts.some((part) => outbox.states.get(placeOf(number, part.part)) === 'kept here')) return { number, state: 'kept here', says: 'only here' };
    if (flags.has(number)) return { number, state: 'flagged' };
    if (done === 0) return { number, state: 'blank' };
    return done === question.parts.length ? { number, state: 'answered' } : { number, state: 'in part', says: `${done} of ${question.parts.length}` };
  });
}

/** What is blank, for the summary before handing in. */
export function blanks(questions: readonly Question[], outbox: OutboxView): { number: number; parts: string[] }[] {
  return questions
    .map((question, index) => ({
      number: index + 1,
      parts: question.parts.filter((part) => (outbox.answers.get(placeOf(index + 1, part.part)) ?? '').trim() === '').map((part) => part.part),
    }))
    .filter((row) => row.parts.length > 0);
}
