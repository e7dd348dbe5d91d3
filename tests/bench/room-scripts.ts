import { gzipSync } from 'node:zlib';
import { chromium } from '@playwright/test';
import { type Database, openDatabase } from '@/db/client';
import { runningClusterUrl } from '@/db/cluster';
import { admit } from '@/lib/candidates/commands';
import { classes, password, staff } from '@/lib/demo/cast';
import { asAccount, must, setMinutes } from '@/lib/demo/stage';
import { openCheckIn, startSitting } from '@/lib/sittings/commands';
import { signInOver } from '../support/sign-in';
import type { Served } from './start';

export interface ScriptMeasure { files: number; bytes: number; gzip: number }

/** Starts the demo's next sitting with its first candidate; gives who that is and where. */
async function startNextSitting(db: Database): Promise<{ sittingId: string; identifier: string }> {
  const sitting = await db.selectFrom('sitting').select('id').where('state', '=', 'planned').orderBy('starts_at').limit(1).executeTakeFirstOrThrow();
  const account = await db.selectFrom('account').select(['id', 'name']).where('name', '=', staff.proctor.name).executeTakeFirstOrThrow();
  const learner = classes[1]?.learners[0];
  const candidate = await db
    .selectFrom('candidate').innerJoin('account', 'account.id', 'candidate.account_id').select('candidate.id')
    .where('sitting_id', '=', sitting.id).where('account.learner_number', '=', learner?.number ?? '').executeTakeFirstOrThrow();
  const proctor = asAccount(db, account.id, account.name, ['proctor']);
  await setMinutes(db, 20);
  must(await openCheckIn(proctor, sitting.id), 'opening check-in');
  must(await admit(proctor, sitting.id, [candidate.id]), 'admitting');
  must(await startSitting(proctor, sitting.id), 'starting');
  return { sittingId: sitting.id, identifier: learner?.number ?? '' };
}

const launch = () => chromium.launch({
  executablePath: '/usr/bin/chromium',
  args: ['--headless', '--no-sandbox', '--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-component-update', '--disable-sync'],
});

/**
 * JavaScript that a browser with an empty cache loads for the exam room, from the address until a question can be answered: files, bytes,
 * and bytes after gzip at its usual level. `served` has the demo in it.
 */
export async function measureRoomScripts(served: Served): Promise<ScriptMeasure> {
  const address = await runningClusterUrl(served.dataDir);
  if (!address) throw new Error('The database of the installation does not run.');
  const db = openDatabase(address, 'fullfield_app', { max: 2 });
  const browser = await launch();
  try {
    const { sittingId, identifier } = await startNextSitting(db);
    const [name = '', value = ''] = (await signInOver(served.url, identifier, password)).split('=');
    const context = await browser.newContext({ serviceWorkers: 'block' });
    await context.addCookies([{ name, value, url: served.url }]);
    const page = await context.newPage();
    const scripts = new Map<string, Promise<Buffer>>();
    page.on('response', (response) => {
      if (/javascript/.test(response.headers()['content-type'] ?? '')) scripts.set(response.url(), response.body());
    });
    await page.goto(`${served.url}/sit/${sittingId}`);
    await page.getByRole('main').getByRole('textbox').or(page.getByRole('main').getByRole('radio')).first().waitFor({ timeout: 60_000 });
    const bodies = await Promise.all(scripts.values());
    return { files: bodies.length, bytes: bodies.reduce((sum, body) => sum + body.length, 0), gzip: bodies.reduce((sum, body) => sum + gzipSync(body).length, 0) };
  } finally {
    await browser.close();
    await db.destroy();
  }
}
