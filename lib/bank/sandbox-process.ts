import type { Library } from '@/lib/templates/library';
import { loadLibrary } from './library';
import type { Answers, Task } from './sandbox-tasks';
import { check, preview, read } from './sandbox-work';

// Runs as a process of its own (sandbox.ts starts and ends it): tasks come and answers go as messages.
let library: Library | undefined;
// A parent that went away while something was told is seen by 'disconnect'; the failed message says nothing more.
const send = (message: unknown): void => void process.send?.(message, undefined, undefined, () => undefined);

function perform(task: Task): Answers[Task['kind']] {
  library ??= loadLibrary();
  if (task.kind === 'read') return read(task.text, library).reading;
  if (task.kind === 'preview') return preview(task.text, task.seed, task.locale, library);
  return check(task.text, task.draws, library, (done) => send({ kind: 'progress', done }));
}

process.on('message', (task: Task) => {
  send({ kind: 'ready' });
  try {
    send({ kind: 'answer', value: perform(task) });
  } catch (error) {
    // A bug of ours, told so that the request which met it can say so instead of waiting.
    process.stderr.write(`${error instanceof Error ? (error.stack ?? error.message) : String(error)}\n`);
    send({ kind: 'error', says: 'Reading this text failed inside Fullfield. The text is kept; tell whoever runs this installation.' });
  }
});
// The parent is gone: nobody waits for an answer.
process.on('disconnect', () => process.exit(0));
