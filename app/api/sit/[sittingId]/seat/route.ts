import { z } from 'zod';
import { routeContext } from '@/lib/auth/context';
import { takeSeat } from '@/lib/candidates/seat-commands';
import { readOwnPlace } from '@/lib/candidates/seat-queries';
import { answer, refusal, seatCookie, unreadable } from '../seat';

const body = z.object({ device: z.string().regex(/^[A-Za-z0-9_-]{16,64}$/) });

/** Asked by a signed-in student until admitted: tells cover and state; once there is a seat, this device gets it. */
export async function POST(request: Request, { params }: { params: Promise<{ sittingId: string }> }): Promise<Response> {
  const { sittingId } = await params;
  const context = await routeContext(request, 'student');
  if (!context.ok) return refusal(context);
  const parsed = body.safeParse(await request.json().catch(() => null));
  if (!parsed.success) return unreadable();
  const taken = await takeSeat(context.value, sittingId, parsed.data.device);
  if (!taken.ok) return refusal(taken);
  const place = await readOwnPlace(context.value, sittingId);
  if (!place.ok) return refusal(place);
  const headers: Record<string, string> = taken.value ? { 'set-cookie': seatCookie(taken.value) } : {};
  return answer({ ok: true, seated: taken.value !== null, ...place.value }, 200, headers);
}
