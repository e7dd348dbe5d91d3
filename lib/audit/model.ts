import { createHash } from 'node:crypto';

/** What goes into the log: ids and codes. Words about people go into `note`, which can be erased. */
export type EventInput = {
  kind: string;
  subject: string;
  subjectId: string;
  data?: Record<string, string | number | boolean | null | readonly (string | number)[]>;
  note?: string;
};

export type EventFacts = { actorId: string | null; kind: string; subject: string; subjectId: string; data: unknown; noteDigest: Buffer | null };

/** JSON with sorted keys, so that PostgreSQL's `jsonb` (which reorders keys) hashes alike after reading. */
export function canonical(value: unknown): string {
  if (value === null || typeof value !== 'object') return JSON.stringify(value) ?? 'null';
  if (Array.isArray(value)) return `[${value.map(canonical).join(',')}]`;
  const entries = Object.entries(value as Record<string, unknown>).filter(([, inner]) => inner !== undefined);
  entries.sort(([a], [b]) => (a < b ? -1 : 1));
  return `{${entries.map(([key, inner]) => `${JSON.stringify(key)}:${canonical(inner)}`).join(',')}}`;
}

/** Digest of erasable words under the event's salt (SHA-256). */
export const noteDigestOf = (salt: Buffer, note: string): Buffer => createHash('sha256').update(salt).update(note).digest();

/** SHA-256 (hex) of a row as the log binds it: rows of marks and results put it into their event's data, so that a changed row is named. */
export const rowDigest = (row: unknown): string => createHash('sha256').update(canonical(row)).digest('hex');

/** Salted commitment of one event (SHA-256): personal text is bound by its own digest, so erasing it later breaks nothing else. */
export function commitmentOf(salt: Buffer, facts: EventFacts): Buffer {
  const body = canonical([facts.actorId, facts.kind, facts.subject, facts.subjectId, facts.data, facts.noteDigest?.toString('hex') ?? null]);
  return createHash('sha256').update(salt).update(body).digest();
}

/** Digest of a block: the one before it, its number and the commitments in order. */
export function blockDigest(previous: Buffer, number: number, commitments: readonly Buffer[]): Buffer {
  const hash = createHash('sha256').update(previous).update(String(number));
  for (const commitment of commitments) hash.update(commitment);
  return hash.digest();
}
