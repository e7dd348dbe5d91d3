import { readCheck } from '@/lib/bank/queries';
import { answerById } from '../../answer';

export const GET = async (request: Request, { params }: { params: Promise<{ checkId: string }> }): Promise<Response> =>
  answerById(request, (await params).checkId, readCheck);
