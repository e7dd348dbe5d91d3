import path from 'node:path';
import { openDatabase } from '@/db/client';
import { readClock } from '@/db/clock';
import { dumpDatabase } from './dump';
import { dataDirectory, root, withDatabase } from './embedded';

async function moment(url: string): Promise<string> {
  const owner = openDatabase(url, undefined, { max: 1 });
  try {
    return (await readClock(owner)).toISOString().slice(0, 19).replaceAll(':', '');
  } finally {
    await owner.destroy();
  }
}

/** `npm run backup [-- FILE]`: the whole database in one file. May be run beside a running Fullfield, during a sitting too. */
await withDatabase(async (url) => {
  const given = process.argv[2];
  const file = given ? path.resolve(given) : path.join(dataDirectory(), 'backups', `fullfield-${await moment(url)}.dump`);
  await dumpDatabase(url, file);
  const { size } = await import('node:fs').then(({ promises }) => promises.stat(file));
  process.stdout.write(
    `Backup written: ${path.relative(root, file)} (${Math.ceil(size / 1024)} kB)\n` +
      'It holds everything, names and results too: keep it where only you can read it, and a copy on another machine.\n' +
      'The keys in secrets.json are not in it and are not needed: after a restore with new keys people sign in again.\n',
  );
});
