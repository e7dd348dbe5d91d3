import { Logger } from 'graphile-worker';

/** Of the queue's own chatter only warnings and errors reach the log, one line each. */
export const quietLogger = new Logger(() => (level, message) => {
  if (level === 'error' || level === 'warning') process.stderr.write(`${JSON.stringify({ level, part: 'queue', message })}\n`);
});
