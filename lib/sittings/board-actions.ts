import { z } from 'zod';

const id = z.guid();
const ids = z.array(id).min(1).max(400);
const reason = z.string().trim().min(1, 'Say why, in a few words.').max(500, 'At most 500 characters.');
const minutes = z.number('Give whole minutes.').int('Give whole minutes.').min(1, 'From 1 to 240 minutes.').max(240, 'From 1 to 240 minutes.');

/** Everything a proctor may do from the board; one schema for browser and server. */
export const boardAction = z.discriminatedUnion('do', [
  z.object({ do: z.literal('open-check-in') }),
  z.object({ do: z.literal('start') }),
  z.object({ do: z.literal('pause'), reason }),
  z.object({ do: z.literal('resume') }),
  z.object({ do: z.literal('close') }),
  z.object({ do: z.literal('reconcile') }),
  z.object({ do: z.literal('abandon'), reason }),
  z.object({ do: z.literal('admit'), candidates: ids }),
  z.object({ do: z.literal('refuse'), candidate: id, reason }),
  z.object({ do: z.literal('start-late'), candidates: ids, minutes: minutes.max(600).nullable(), reason: z.string().max(500) }),
  z.object({ do: z.literal('pause-one'), candidate: id, reason }),
  z.object({ do: z.literal('resume-one'), candidate: id }),
  z.object({ do: z.literal('begin-rest'), candidate: id }),
  z.object({ do: z.literal('end-rest'), candidate: id }),
  z.object({ do: z.literal('add-time'), candidates: ids, minutes, reason }),
  z.object({ do: z.literal('withdraw'), candidate: id, reason }),
  z.object({ do: z.literal('reopen'), candidate: id, minutes, reason }),
  z.object({ do: z.literal('transfer'), candidate: id, reason }),
  z.object({ do: z.literal('incident'), candidate: id.nullable(), words: z.string().trim().min(1, 'Write what happened.').max(4000, 'At most 4,000 characters.') }),
  z.object({ do: z.literal('answer-help'), candidate: id }),
]);
export type BoardAction = z.infer<typeof boardAction>;
