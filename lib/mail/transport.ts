import nodemailer from 'nodemailer';

export type ReadyMail = {
  from: { name: string; address: string };
  to: string;
  subject: string;
  text: string;
  messageId: string;
  attachments: { filename: string; contentType: string; content: string | Buffer }[];
};

/** How one attempt ended; `says` is the server's or the system's own words, for a person. */
export type Outcome = { event: 'taken' | 'refused' | 'not now' | 'cut off'; says: string };

const seconds = 1000;

type SendError = Error & { responseCode?: number; response?: string; code?: string };

/**
 * Decides what an error means. A reply of the server is definite: 5xx refuses for good, 4xx for now. Without a reply it depends
 * on whether DATA had been sent: before that nothing was handed over, after it nobody can tell (RFC 5321, 4.2.5 and 4.5.3.2).
 */
function judge(error: SendError, handedOver: boolean): Outcome {
  const says = (error.response ?? error.message).replace(/\s+/g, ' ').slice(0, 300);
  if (error.responseCode) return { event: error.responseCode >= 500 ? 'refused' : 'not now', says };
  if (handedOver) return { event: 'cut off', says };
  return { event: error.code === 'EENVELOPE' ? 'refused' : 'not now', says };
}

/** Hands one message to the server at `smtpUrl` (smtp:// or smtps://, with user and password where it wants them). Never throws for the server's sake. */
export async function sendOnce(smtpUrl: string, mail: ReadyMail): Promise<Outcome> {
  let handedOver = false;
  const watch = (entry: unknown, line: unknown) => {
    const from = typeof entry === 'object' && entry !== null && 'tnx' in entry ? entry.tnx : undefined;
    if (from === 'client' && line === 'DATA') handedOver = true;
  };
  const nothing = () => undefined;
  const logger = { trace: watch, debug: watch, info: nothing, warn: nothing, error: nothing, fatal: nothing };
  const transport = nodemailer.createTransport({
    url: smtpUrl,
    connectionTimeout: 15 * seconds,
    greetingTimeout: 15 * seconds,
    socketTimeout: 60 * seconds,
    disableFileAccess: true,
    disableUrlAccess: true,
    transactionLog: true,
    logger,
  });
  try {
    const info = await transport.sendMail({ ...mail, headers: { 'Auto-Submitted': 'auto-generated' } });
    return { event: 'taken', says: String(info.response ?? '').slice(0, 300) };
  } catch (error) {
    return judge(error as SendError, handedOver);
  } finally {
    transport.close();
  }
}
