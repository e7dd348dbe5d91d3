import { simpleParser } from 'mailparser';
import { SMTPServer } from 'smtp-server';
import type { Database } from '@/db/client';

export type ReceivedMail = { from: string; to: string; subject: string; text: string; messageId: string; raw: Buffer };

export type SinkOptions = {
  /** TCP port on 127.0.0.1; 0 takes a free one. */
  port: number;
  keep(mail: ReceivedMail): Promise<void>;
  /** Refuses a recipient: an SMTP reply such as 550. For tests of what a real server may say. */
  refuses?(address: string): { code: number; says: string } | undefined;
};

export type Sink = { port: number; url: string; close(): Promise<void> };

const gather = async (stream: AsyncIterable<Buffer>): Promise<Buffer> => {
  const pieces: Buffer[] = [];
  for await (const piece of stream) pieces.push(piece);
  return Buffer.concat(pieces);
};

async function read(raw: Buffer, from: string, to: string): Promise<ReceivedMail> {
  const parsed = await simpleParser(raw);
  return { from, to, subject: parsed.subject ?? '', text: parsed.text ?? '', messageId: parsed.messageId ?? '', raw };
}

/** A mail server on loopback that delivers nowhere and keeps what it is given. It answers "250" only when a message is kept. */
export async function startSink(options: SinkOptions): Promise<Sink> {
  const server = new SMTPServer({
    authOptional: true,
    disabledCommands: ['AUTH', 'STARTTLS'],
    disableReverseLookup: true,
    size: 30 * 1024 * 1024,
    onRcptTo(address, _session, callback) {
      const refused = options.refuses?.(address.address);
      callback(refused ? Object.assign(new Error(refused.says), { responseCode: refused.code }) : null);
    },
    onData(stream, session, callback) {
      const from = session.envelope.mailFrom ? session.envelope.mailFrom.address : '';
      const to = session.envelope.rcptTo.map((one) => one.address).join(', ');
      gather(stream)
        .then((raw) => read(raw, from, to))
        .then((mail) => options.keep(mail))
        .then(() => callback(null, 'kept'))
        .catch((error: unknown) => callback(Object.assign(new Error(String(error)), { responseCode: 451 })));
    },
  });
  server.on('error', () => undefined);
  await new Promise<void>((resolve, reject) => {
    server.server.once('error', reject);
    server.listen(options.port, '127.0.0.1', resolve);
  });
  const address = server.server.address();
  const port = address !== null && typeof address === 'object' ? address.port : options.port;
  return { port, url: `smtp://127.0.0.1:${port}`, close: () => new Promise((resolve) => server.close(() => resolve())) };
}

/** Keeps mail in table sink_mail, where every process can read it. */
export const keepIn = (db: Database) => async (mail: ReceivedMail): Promise<void> => {
  await db
    .insertInto('sink_mail')
    .values({
      from_address: mail.from,
      to_address: mail.to,
      subject: mail.subject,
      text_body: mail.text,
      message_id: mail.messageId,
      raw: mail.raw,
    })
    .execute();
};
