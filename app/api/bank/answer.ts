import { refusalResponse, routeContext, type SignedIn } from '@/lib/auth/context';
import { idInput } from '@/lib/bank/model';
import { notFound, type Result } from '@/lib/result';

/** A result as JSON that no cache keeps. */
export const jsonAnswer = (result: Result<unknown>): Response =>
  result.ok ? Response.json(result.value, { headers: { 'cache-control': 'no-store' } }) : refusalResponse(result);

/** Answers `query` of the id in the address, for instructors; what is no id names nothing. */
export async function answerById(request: Request, id: string, query: (context: SignedIn, id: string) => Promise<Result<unknown>>): Promise<Response> {
  const context = await routeContext(request, 'instructor');
  if (!context.ok) return refusalResponse(context);
  return jsonAnswer(idInput.safeParse({ id }).success ? await query(context.value, id) : notFound());
}
