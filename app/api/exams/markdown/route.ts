import { z } from 'zod';
import { refusalResponse, routeContext } from '@/lib/auth/context';
import { textHtml } from '@/lib/exams/assemble';
import { refuse } from '@/lib/result';

const input = z.strictObject({ text: z.string().max(12_000, 'The text is longer than 12,000 characters.') });

/** A text of an exam as it is printed; nothing is stored. */
export async function POST(request: Request): Promise<Response> {
  const context = await routeContext(request, 'instructor');
  if (!context.ok) return refusalResponse(context);
  const read = input.safeParse(await request.json().catch(() => null));
  if (!read.success) return refusalResponse(refuse('unread', read.error.issues[0]?.message ?? 'The request does not read.'));
  return Response.json({ html: textHtml(read.data.text) }, { headers: { 'cache-control': 'no-store' } });
}
