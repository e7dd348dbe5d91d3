import { hash, verify } from '@node-rs/argon2';

// argon2id, 19 MiB, two passes, one lane: OWASP Password Storage Cheat Sheet. The package's defaults are argon2id, version 0x13.
const cost = { memoryCost: 19_456, timeCost: 2, parallelism: 1 };

// NFKC, so that a password typed on another keyboard or system stays the same (NIST SP 800-63B, 5.1.1.2).
const normal = (password: string): string => password.normalize('NFKC');

/** argon2id hash (PHC string) of a password. */
export const hashPassword = (password: string): Promise<string> => hash(normal(password), cost);

let nobody: Promise<string> | undefined;

/**
 * Whether `password` is that of `stored`. With `stored` null (unknown account, no password yet) the same work is done on a hash
 * that no password has, so that the time tells nothing.
 */
export async function passwordMatches(stored: string | null, password: string): Promise<boolean> {
  nobody ??= hashPassword(crypto.randomUUID());
  const matches = await verify(stored ?? (await nobody), normal(password));
  return stored !== null && matches;
}
