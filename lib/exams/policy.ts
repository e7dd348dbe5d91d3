import { type Actor, holds } from '@/lib/context';

/** Exams are read, written and reviewed by instructors; for everybody else they do not exist. */
export const mayUseExams = (actor: Actor): boolean => holds(actor, 'instructor');
