import { createHmac, timingSafeEqual } from 'node:crypto';

/** What a seat token says: this device holds this candidate's seat, as of this epoch. */
export type Seat = { candidateId: string; sittingId: string; device: string; epoch: number };

const sign = (body: string, secret: string): string => createHmac('sha256', secret).update(body).digest('base64url');

/** A signed token for the device that holds a seat; carried in an HttpOnly cookie whose path is the sitting's. */
export function sealSeat(seat: Seat, secret: string): string {
  const body = Buffer.from(JSON.stringify([1, seat.candidateId, seat.sittingId, seat.device, seat.epoch])).toString('base64url');
  return `${body}.${sign(body, secret)}`;
}

/** The seat of a token, or null when it is not ours, not whole or not for this sitting. No database is asked. */
export function readSeat(token: string, sittingId: string, secret: string): Seat | null {
  const [body, signature] = token.split('.');
  if (!body || !signature) return null;
  const expected = Buffer.from(sign(body, secret));
  const given = Buffer.from(signature);
  if (expected.length !== given.length || !timingSafeEqual(expected, given)) return null;
  const parts: unknown = JSON.parse(Buffer.from(body, 'base64url').toString());
  if (!Array.isArray(parts) || parts[0] !== 1 || parts[2] !== sittingId) return null;
  const [, candidateId, , device, epoch] = parts as [number, string, string, string, number];
  return { candidateId, sittingId, device, epoch };
}
