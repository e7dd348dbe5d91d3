import { candidateDb } from '@/db/client';
import { config } from '@/lib/config';
import { readSeat, sealSeat, type Seat } from '@/lib/candidates/seat-token';

const cookieName = 'seat';

/** What a handler of the room works with: the seat of the token, and the database as the candidate's role. */
export const roomDb = candidateDb;

/** The seat that the request's cookie speaks of, or null. */
export function seatOf(request: Request, sittingId: string): Seat | null {
  const cookies = request.headers.get('cookie') ?? '';
  for (const part of cookies.split(';')) {
    const [name, value] = part.trim().split('=');
    if (name === cookieName && value) return readSeat(value, sittingId, config().seatKey);
  }
  return null;
}

/** A cookie that only this sitting's own handlers get back. */
export function seatCookie(seat: Seat): string {
  const secure = config().publicUrl.startsWith('https:') ? '; Secure' : '';
  return `${cookieName}=${sealSeat(seat, config().seatKey)}; Path=/api/sit/${seat.sittingId}; HttpOnly; SameSite=Strict; Max-Age=86400${secure}`;
}

const statuses: Record<string, number> = { 'signed-out': 401, 'not-found': 404, 'other-device': 409, ended: 409, stopped: 409, 'wrong-state': 409, 'time-over': 409, unreadable: 400 };

export const answer = (body: unknown, status = 200, headers: Record<string, string> = {}): Response =>
  Response.json(body, { status, headers: { 'cache-control': 'no-store', ...headers } });

export const refusal = (refused: { ok: false; code: string; says: string }): Response => answer(refused, statuses[refused.code] ?? 400);

export const noSeat = (): Response => refusal({ ok: false, code: 'not-found', says: 'There is no paper here for this device.' });

export const unreadable = (): Response => refusal({ ok: false, code: 'unreadable', says: 'The request could not be read.' });
