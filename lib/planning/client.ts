import type { PaperState } from './model';

export type PapersWire = { papers: PaperState; drawn: number; of: number; says: string };
export const planKeys = { papers: (sittingId: string) => ['sittings', sittingId, 'papers'] as const };

/** How far the drawing of a sitting's papers is. */
export async function fetchPapers(sittingId: string, signal?: AbortSignal): Promise<PapersWire> {
  const response = await fetch(`/api/sittings/${sittingId}/papers`, { signal });
  if (!response.ok) throw new Error('The server did not answer as expected. It is asked again by itself.');
  return (await response.json()) as PapersWire;
}
