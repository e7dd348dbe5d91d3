import type { BoardSnapshot, TimelineEntry } from './board-model';

async function read<Value>(path: string): Promise<Value> {
  const response = await fetch(path, { cache: 'no-store' });
  if (!response.ok) throw new Error(`The server answered ${response.status}.`);
  return (await response.json()) as Value;
}

export const boardKey = (sittingId: string) => ['sittings', sittingId, 'board'] as const;
export const fetchBoard = (sittingId: string) => read<BoardSnapshot>(`/api/sittings/${sittingId}/board`);
export const boardStream = (sittingId: string): string => `/api/sittings/${sittingId}/board/stream`;

export const timelineKey = (sittingId: string, candidateId: string | null, number: number) => ['sittings', sittingId, 'timeline', candidateId, number] as const;
export const fetchTimeline = (sittingId: string, candidateId: string | null) =>
  read<TimelineEntry[]>(`/api/sittings/${sittingId}/timeline${candidateId ? `?candidate=${candidateId}` : ''}`);
