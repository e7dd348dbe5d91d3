import { z } from 'zod';
import { roles } from '@/lib/context';

export const accountStates = ['invited', 'active', 'closed'] as const;
export type AccountState = (typeof accountStates)[number];

/** One line of text, spaces at the ends taken off and runs of them made one. */
export const oneLine = (most: number) =>
  z
    .string()
    .max(most, `Use at most ${most} characters.`)
    .regex(/^[^\p{Cc}]*$/u, 'Keep it on one line.');

export const tidy = (text: string): string => text.normalize('NFC').replace(/\s+/gu, ' ').trim();

export const nameField = oneLine(120).refine((text) => tidy(text) !== '', 'Give the name; one word is enough.');
export const emailField = z.union([z.literal(''), z.string().trim().max(254, 'Use at most 254 characters.').pipe(z.email('Give an address such as name@example.org, or leave it empty.'))]);
// Without @, so that no learner number can pass for somebody's e-mail.
export const learnerNumberField = z.union([
  z.literal(''),
  z.string().trim().regex(/^[\p{L}\p{N}][\p{L}\p{N} ._/-]{0,39}$/u, 'Use letters, figures, hyphen, stop, stroke or space, at most 40, beginning with a letter or figure.'),
]);

const someIdentifier = (value: { email: string; learnerNumber: string }): boolean => value.email !== '' || value.learnerNumber !== '';
const noIdentifier = { message: 'Give an e-mail or a learner number: one of them is needed to sign in.', path: ['email'] };

const particulars = z.object({ name: nameField, sortName: oneLine(120), email: emailField, learnerNumber: learnerNumberField });

/** Who somebody is. `sortName` empty: made from the name. */
export const particularsSchema = particulars.refine(someIdentifier, noIdentifier);
export type Particulars = z.infer<typeof particularsSchema>;

export const rolesField = z.array(z.enum(roles)).min(1, 'Give at least one role.');

/** A new person. */
export const personSchema = particulars.extend({ roles: rolesField }).refine(someIdentifier, noIdentifier);
export type PersonInput = z.infer<typeof personSchema>;

export const rolesSchema = z.object({ roles: rolesField });

/** "Anneke van der Berg" → "van der Berg, Anneke": the last word with the small words before it comes first; one word stays as it is. */
export function sortNameOf(name: string): string {
  const words = tidy(name).split(' ');
  let first = words.length - 1;
  while (first > 1 && /^\p{Ll}/u.test(words[first - 1] ?? '')) first--;
  return first < 1 ? words.join(' ') : `${words.slice(first).join(' ')}, ${words.slice(0, first).join(' ')}`;
}

/** What is stored: tidied, addresses in small letters, nothing as null. */
export function normalParticulars(input: Particulars): { name: string; sort_name: string; email: string | null; learner_number: string | null } {
  const name = tidy(input.name);
  return {
    name,
    sort_name: tidy(input.sortName) || sortNameOf(name),
    email: input.email.trim().toLowerCase() || null,
    learner_number: tidy(input.learnerNumber) || null,
  };
}
