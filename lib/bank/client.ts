import type { CheckState } from './model';
import type { Preview } from './sandbox-tasks';

/** A check as the browser polls it. Times are ISO 8601. */
export type CheckWire = { id: string; state: CheckState; done: number; draws: number; says: string; current: boolean; askedAt: string; report: unknown };
export type TextWire = { text: string; revision: number; changedBy: string | null; changedAt: string };
export type VersionWire = { text: string; number: number; slug: string; title: string };

export const bankKeys = {
  preview: (text: string, seed: string) => ['bank', 'preview', text, seed] as const,
  check: (id: string) => ['bank', 'check', id] as const,
  version: (id: string) => ['bank', 'version', id] as const,
};

/** Trouble that the server put in words; its message may be shown. */
export class SaidError extends Error {}

async function answer<Value>(response: Response): Promise<Value> {
  const body: unknown = await response.json().catch(() => null);
  if (response.ok) return body as Value;
  const says = typeof body === 'object' && body !== null && 'says' in body && typeof body.says === 'string' ? body.says : null;
  throw new SaidError(says ?? 'The server did not answer as expected. Try again in a moment.');
}

const read = async <Value>(path: string, signal?: AbortSignal): Promise<Value> => answer<Value>(await fetch(path, { signal }));

/** One draw of a text that need not be stored. */
export async function fetchPreview(text: string, seed: string, signal?: AbortSignal): Promise<Preview> {
  const body = JSON.stringify({ text, seed });
  return answer<Preview>(await fetch('/api/bank/preview', { method: 'POST', headers: { 'content-type': 'application/json' }, body, signal }));
}
export const fetchCheck = (id: string, signal?: AbortSignal): Promise<CheckWire> => read<CheckWire>(`/api/bank/checks/${id}`, signal);
export const fetchVersion = (id: string, signal?: AbortSignal): Promise<VersionWire> => read<VersionWire>(`/api/bank/versions/${id}`, signal);
export const fetchWorkingText = (id: string): Promise<TextWire> => read<TextWire>(`/api/bank/templates/${id}`);
