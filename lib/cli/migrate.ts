import { prepareDatabase } from './prepare';
import { withDatabase } from './embedded';

/** `npm run db:migrate`: brings the database of DATABASE_URL, or the embedded one, to the newest schema. */
await withDatabase(async (url) => {
  const applied = await prepareDatabase(url);
  process.stdout.write(applied.length === 0 ? 'The database is up to date.\n' : `Applied: ${applied.join(', ')}\n`);
});
