import { createHash, randomBytes, randomInt } from 'node:crypto';

/** A token for a link: 256 random bits, base64url. Only its digest is stored. */
export const newToken = (): string => randomBytes(32).toString('base64url');

/** SHA-256 of a token; random tokens need no slow hash. */
export const tokenDigest = (token: string): Buffer => createHash('sha256').update(token).digest();

// Without I, L, O, 0, 1, U: what is misread on paper or spells words.
const letters = 'ABCDEFGHJKMNPQRSTVWXYZ23456789';
const groups = 3;
const groupLength = 4;

/** A code for a printed slip, "7KQM-2XRB-9DTH": 12 of 30 characters, 58 bits. */
export const newSlipCode = (): string =>
  Array.from({ length: groups }, () => Array.from({ length: groupLength }, () => letters[randomInt(letters.length)]).join('')).join('-');

/** Digest of a slip's code, bound to its account. Case, spaces and hyphens do not matter. */
export const slipDigest = (accountId: string, code: string): Buffer =>
  createHash('sha256').update(`${accountId}:${code.toUpperCase().replace(/[^A-Z0-9]/g, '')}`).digest();

/** Key of a row in the table of delays; a digest, so that what was typed is not kept. */
export const delayKey = (kind: string, ...values: string[]): string =>
  `${kind}:${createHash('sha256').update(values.join('\n')).digest('base64url')}`;
