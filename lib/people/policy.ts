import { type Actor, holds } from '@/lib/context';

/** Accounts, roles, terms, classes, enrolment and accommodations are the registrar's. */
export const mayManagePeople = (actor: Actor): boolean => holds(actor, 'registrar');
