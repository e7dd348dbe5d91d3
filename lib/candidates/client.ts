import type { PaperContent } from '@/lib/exams/paper';
import type { FlagChange, Revision, RoomCover, RoomState } from './model';

export type SavedRevision = { question: number; part: string; sequence: number };
export type OpenedPaper = {
  content: PaperContent;
  answers: { question: number; part: string; sequence: number; answer: string }[];
  flags: { question: number; sequence: number; flagged: boolean }[];
};
export type Refused = { ok: false; code: string; says: string; claimed?: SavedRevision[] };
/** `no-contact`: the request did not reach a server that answers; it may be sent again. */
type Answer<Body> = (Body & { ok: true }) | Refused;

const noContact: Refused = { ok: false, code: 'no-contact', says: 'There is no contact with the server.' };
const patience = 10_000;

async function ask<Body>(path: string, body?: unknown): Promise<Answer<Body>> {
  try {
    const response = await fetch(path, {
      method: body === undefined ? 'GET' : 'POST',
      cache: 'no-store',
      signal: AbortSignal.timeout(patience),
      ...(body === undefined ? {} : { headers: { 'content-type': 'application/json' }, body: JSON.stringify(body) }),
    });
    if (response.status >= 500) return noContact;
    return (await response.json()) as Answer<Body>;
  } catch {
    return noContact;
  }
}

/** Requests of the exam room for one sitting. Each is safe to repeat. */
export const roomClient = (sittingId: string) => {
  const at = `/api/sit/${sittingId}`;
  return {
    seat: (device: string) => ask<{ seated: boolean; cover: RoomCover; state: RoomState }>(`${at}/seat`, { device }),
    state: () => ask<{ state: RoomState }>(`${at}/state`),
    paper: () => ask<{ paper: OpenedPaper }>(`${at}/paper`),
    save: (revisions: Revision[]) => ask<{ now: number; saved: SavedRevision[] }>(`${at}/responses`, { revisions }),
    flag: (change: FlagChange) => ask<object>(`${at}/flags`, change),
    handIn: () => ask<{ value: { state: string } }>(`${at}/hand-in`, {}),
    help: () => ask<object>(`${at}/help`, {}),
    declare: () => ask<object>(`${at}/declare`, {}),
    streamPath: `${at}/stream`,
  };
};
export type RoomClient = ReturnType<typeof roomClient>;
