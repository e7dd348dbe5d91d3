import { followParent } from '@/lib/cli/parent';
import { closeStreams } from './stream';

const shared = globalThis as typeof globalThis & { fullfieldShutdown?: boolean };

/**
 * Makes a server process answer SIGTERM soon: open streams are closed at once, and whatever still holds a connection after
 * 1.5 s is cut (a browser's outbox sends again). Also when the process that started this one was killed.
 */
export function prepareShutdown(): void {
  if (shared.fullfieldShutdown) return;
  shared.fullfieldShutdown = true;
  const stop = () => {
    closeStreams();
    setTimeout(() => process.exit(143), 1_500).unref();
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
  followParent(() => process.kill(process.pid, 'SIGTERM'));
}
