import os from 'node:os';
import { openDatabase } from '@/db/client';
import { followParent } from '@/lib/cli/parent';
import { config } from '@/lib/config';
import { requeueMail } from '@/lib/mail/send';
import { startWorker } from './run';

/** The worker process: jobs and rounds beside the servers, at lower priority, so that a sitting comes first. */
async function main(): Promise<void> {
  os.setPriority(os.constants.priority.PRIORITY_BELOW_NORMAL);
  const { databaseUrl } = config();
  const db = openDatabase(databaseUrl, 'fullfield_app', { max: 1 });
  await requeueMail(db);
  await db.destroy();
  const worker = await startWorker({ url: databaseUrl });
  let stopping = false;
  const stop = () => {
    if (stopping) return;
    stopping = true;
    // A job that does not end is given back by the next worker, which finds this one dead.
    setTimeout(() => process.exit(0), 8_000).unref();
    void worker.stop().then(() => process.exit(0));
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
  followParent(stop);
}

await main();
