import { z } from 'zod';
import type { Seated } from './running-room';

export type Sent = { candidateId: string; question: number; part: string; sequence: number; answer: string };
export type SteadyWriter = {
  /** Every revision ever sent, in order; the last ones may not be acknowledged yet. */
  sent: Sent[];
  /** What the server said is stored. */
  acknowledged: Sent[];
  /** Requests that brought no acknowledgement, and were sent again. */
  unanswered: number;
  /** Sends what is under way until it is acknowledged, then no more. */
  finish(): Promise<void>;
};

const savedAnswer = z.object({ ok: z.literal(true), saved: z.array(z.object({ question: z.number(), part: z.string(), sequence: z.number() })) });

type Revision = Omit<Sent, 'candidateId'> & { typedAt: number };
const sameAs = (saved: { question: number; part: string; sequence: number }) => (one: Sent) =>
  one.question === saved.question && one.part === saved.part && one.sequence === saved.sequence;

/**
 * Writes as an exam room's outbox does, without a pause: one to three revisions a request, the same ones again until they are
 * acknowledged, through each server process in turn.
 */
export function startSteadyWriter({ candidateId, seat }: Seated, cookie: string, urls: readonly string[]): SteadyWriter {
  const writer = { sent: [] as Sent[], acknowledged: [] as Sent[], unanswered: 0 };
  let finishing = false;
  let requests = 0;
  let sequence = 0;
  const post = async (revisions: Revision[]) => {
    const url = urls[(requests += 1) % urls.length];
    const response = await fetch(`${url}/api/sit/${seat.sittingId}/responses`, {
      method: 'POST', headers: { 'content-type': 'application/json', cookie }, body: JSON.stringify({ revisions }), signal: AbortSignal.timeout(5_000),
    });
    if (response.status >= 500) return [];
    // Anything else than an acknowledgement is a mistake of the program here, and ends the writer.
    return savedAnswer.parse(await response.json()).saved;
  };
  const untilAcknowledged = async (batch: Sent[]) => {
    let waiting = batch;
    while (waiting.length > 0) {
      const saved = await post(waiting.map(({ candidateId: _, ...one }) => ({ ...one, typedAt: 0 }))).catch((error: unknown) => {
        if (error instanceof z.ZodError) throw error;
        return [];
      });
      if (saved.length === 0) {
        writer.unanswered += 1;
        await new Promise((resolve) => setTimeout(resolve, 20));
      }
      writer.acknowledged.push(...waiting.filter((one) => saved.some((row) => sameAs(row)(one))));
      waiting = waiting.filter((one) => !saved.some((row) => sameAs(row)(one)));
    }
  };
  const work = (async () => {
    while (!finishing) {
      const batch = Array.from({ length: (sequence % 3) + 1 }, () => {
        sequence += 1;
        return { candidateId, question: (sequence % 2) + 1, part: sequence % 4 < 2 ? 'a' : 'b', sequence, answer: `${seat.device} ${sequence} Ω` };
      });
      writer.sent.push(...batch);
      await untilAcknowledged(batch);
    }
  })();
  // Told by finish(); without this a writer that breaks would end the process first.
  work.catch(() => undefined);
  return Object.assign(writer, {
    async finish() {
      finishing = true;
      await work;
    },
  });
}
