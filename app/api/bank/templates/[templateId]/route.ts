import { workingText } from '@/lib/bank/queries';
import { answerById } from '../../answer';

export const GET = async (request: Request, { params }: { params: Promise<{ templateId: string }> }): Promise<Response> =>
  answerById(request, (await params).templateId, workingText);
