import { type ReceivedMail, type Sink, startSink } from '@/lib/mail/sink';

export type TestSink = Sink & { received: ReceivedMail[] };

/** A mail server that keeps what it gets in memory and answers 451 to busy@…, 550 to nobody@…. */
export async function startTestSink(): Promise<TestSink> {
  const received: ReceivedMail[] = [];
  const sink = await startSink({
    port: 0,
    keep: async (mail) => void received.push(mail),
    refuses(address) {
      if (address.startsWith('nobody@')) return { code: 550, says: 'No such user here' };
      if (address.startsWith('busy@')) return { code: 451, says: 'Try again later' };
      return undefined;
    },
  });
  return { ...sink, received };
}
