import * as candidates from '@/lib/candidates/commands';
import type { Context } from '@/lib/context';
import { refuse, type Result } from '@/lib/result';
import type { BoardAction } from './board-actions';
import * as sittings from './commands';

/** One change that names single candidates is refused as a whole when it fits none of them. */
function asOne(result: Result<candidates.Outcome>): Result<unknown> {
  if (!result.ok || result.value.changed.length > 0) return result;
  const [first] = result.value.refused;
  return first ? refuse(first.code, first.says) : result;
}

/** Runs one action of the board as its command; every command asks its own policy. */
export async function runBoardAction(context: Context, sittingId: string, action: BoardAction): Promise<Result<unknown>> {
  switch (action.do) {
    case 'open-check-in': return sittings.openCheckIn(context, sittingId);
    case 'start': return sittings.startSitting(context, sittingId);
    case 'pause': return sittings.pauseSitting(context, sittingId, action.reason);
    case 'resume': return sittings.resumeSitting(context, sittingId);
    case 'close': return sittings.closeSitting(context, sittingId);
    case 'reconcile': return sittings.reconcileSitting(context, sittingId);
    case 'abandon': return sittings.abandonSitting(context, sittingId, action.reason);
    case 'admit': return asOne(await candidates.admit(context, sittingId, action.candidates));
    case 'refuse': return asOne(await candidates.refuseEntry(context, sittingId, action.candidate, action.reason));
    case 'start-late':
      return asOne(await candidates.startCandidates(context, sittingId, action.candidates, action.minutes === null ? {} : { minutes: action.minutes, reason: action.reason }));
    case 'pause-one': return asOne(await candidates.pauseCandidate(context, sittingId, action.candidate, action.reason));
    case 'resume-one': return asOne(await candidates.resumeCandidate(context, sittingId, action.candidate));
    case 'begin-rest': return asOne(await candidates.beginRest(context, sittingId, action.candidate));
    case 'end-rest': return asOne(await candidates.endRest(context, sittingId, action.candidate));
    case 'add-time': return asOne(await candidates.addTime(context, sittingId, action.candidates, action.minutes, action.reason));
    case 'withdraw': return asOne(await candidates.withdraw(context, sittingId, action.candidate, action.reason));
    case 'reopen': return asOne(await candidates.reopen(context, sittingId, action.candidate, action.minutes, action.reason));
    case 'transfer': return candidates.transfer(context, sittingId, action.candidate, action.reason);
    case 'incident': return candidates.noteIncident(context, sittingId, action.candidate, action.words);
    case 'answer-help': return candidates.answerHelp(context, sittingId, action.candidate);
  }
}
