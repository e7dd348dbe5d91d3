import { versionText } from '@/lib/bank/queries';
import { answerById } from '../../answer';

export const GET = async (request: Request, { params }: { params: Promise<{ versionId: string }> }): Promise<Response> =>
  answerById(request, (await params).versionId, versionText);
