'use server';

import { revalidatePath } from 'next/cache';
import { endAccommodation, giveAccommodation } from '@/lib/accommodations/commands';
import type { AccommodationInput } from '@/lib/accommodations/model';
import { actionContext } from '@/lib/auth/context';
import type { Context, Role } from '@/lib/context';
import { changePerson, closeAccount, inviteAccount, reopenAccount, sendFreshLink, setRoles } from '@/lib/people/commands';
import type { Particulars, PersonInput } from '@/lib/people/model';
import type { Result } from '@/lib/result';

/** The commands read their input with the forms' own schemas. */
async function asRegistrar<Value>(work: (context: Context) => Promise<Result<Value>>): Promise<Result<Value>> {
  const context = await actionContext('registrar');
  if (!context.ok) return context;
  const result = await work(context.value);
  if (result.ok) revalidatePath('/people', 'layout');
  return result;
}

export const addPerson = async (input: PersonInput) => asRegistrar((context) => inviteAccount(context, input));
export const saveParticulars = async (id: string, input: Particulars) => asRegistrar((context) => changePerson(context, id, input));
export const saveRoles = async (id: string, roles: Role[]) => asRegistrar((context) => setRoles(context, id, roles));
export const sendLinkTo = async (id: string) => asRegistrar((context) => sendFreshLink(context, id));
export const closePerson = async (id: string) => asRegistrar((context) => closeAccount(context, id));
export const reopenPerson = async (id: string) => asRegistrar((context) => reopenAccount(context, id));
export const give = async (id: string, input: AccommodationInput) => asRegistrar((context) => giveAccommodation(context, id, input));
export const end = async (id: string) => asRegistrar((context) => endAccommodation(context, id));
