import { refusalResponse, routeContext } from '@/lib/auth/context';
import { previewInput } from '@/lib/bank/model';
import { drawText } from '@/lib/bank/reading';
import { refuse } from '@/lib/result';
import { readSchool } from '@/lib/school/queries';
import { jsonAnswer } from '../answer';

/** Reads and draws a text that need not be stored; nothing is kept of it. */
export async function POST(request: Request): Promise<Response> {
  const context = await routeContext(request, 'instructor');
  if (!context.ok) return refusalResponse(context);
  const input = previewInput.safeParse(await request.json().catch(() => null));
  if (!input.success) return refusalResponse(refuse('unread', input.error.issues[0]?.message ?? 'Send a text and a seed.'));
  const { settings } = await readSchool(context.value.db);
  return jsonAnswer(await drawText(input.data.text, input.data.seed, settings.locale));
}
