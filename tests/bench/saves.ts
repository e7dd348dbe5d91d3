import autocannon from 'autocannon';
import { openDatabase } from '@/db/client';
import { makeRunningRoom, seatCookieOf } from '../support/running-room';
import { prepareTemplate } from '../support/cluster';
import { type Installation, startApp } from '../support/app';
import { measureStatement } from './statement';

/**
 * Requests a second of one server process over ten connections: saves of one answer, each durable before it is acknowledged, and
 * the bare handler, which does nothing; in turns, so that both meet the same machine. `ratio` is the median over the turns.
 * `statement`: the same statement a second, sent by pgbench over ten connections.
 */
export interface SaveMeasure { saves: number; bare: number; ratio: number; statement: number; stored: number }

const candidates = 30;
const connections = 10;

type Load = { path: () => string; cookie: () => string; body: () => string; answered: (status: number, body: string) => void };

async function load(url: string, seconds: number, { path, cookie, body, answered }: Load): Promise<number> {
  const result = await autocannon({
    url, connections, duration: seconds,
    requests: [{
      method: 'POST',
      setupRequest: (request) => ({ ...request, path: path(), headers: { ...request.headers, 'content-type': 'application/json', cookie: cookie() }, body: body() }),
      onResponse: answered,
    }],
  });
  if (result.errors > 0 || result.non2xx > 0) throw new Error(`${result.errors} errors and ${result.non2xx} refusals while measuring ${url}${path()}.`);
  return result['2xx'] / result.duration;
}

const median = (values: readonly number[]): number => [...values].sort((a, b) => a - b)[Math.floor(values.length / 2)] ?? NaN;

/** Measures on `installation`, whose database is empty; makes a sitting that runs in it. Throws where an acknowledged save is not in the database. */
export async function measureSaves(installation: Installation, turns = 8, seconds = 3): Promise<SaveMeasure> {
  await prepareTemplate(installation.databaseUrl);
  const owner = openDatabase(installation.databaseUrl, undefined, { max: 2 });
  const app = openDatabase(installation.databaseUrl, 'fullfield_app', { max: 2 });
  const server = await startApp(installation);
  try {
    const { room, seated } = await makeRunningRoom(owner, app, candidates);
    const cookies = seated.map(({ seat }) => seatCookieOf(seat, installation.secrets.SEAT_KEY));
    let sequence = 0;
    let acknowledged = 0;
    const common = {
      cookie: () => cookies[sequence % candidates] ?? '',
      body: () => JSON.stringify({ revisions: [{ question: 1, part: 'a', sequence: (sequence += 1), answer: '12.5 A', typedAt: 0 }] }),
    };
    const save: Load = { ...common, path: () => `/api/sit/${room.sittingId}/responses`, answered: (_status, body) => void (acknowledged += (JSON.parse(body) as { saved: unknown[] }).saved.length) };
    const nothing: Load = { ...common, path: () => '/api/bare', answered: () => undefined };
    // Warm: the first seconds of a process are its compiler's.
    await load(server.url, 3, save);
    await load(server.url, 3, nothing);
    const taken: { saves: number; bare: number }[] = [];
    for (let turn = 0; turn < turns; turn += 1) taken.push({ saves: await load(server.url, seconds, save), bare: await load(server.url, seconds, nothing) });
    const { count } = await owner.selectFrom('response').select((of) => of.fn.countAll<number>().as('count')).executeTakeFirstOrThrow();
    if (count < acknowledged) throw new Error(`${acknowledged} saves were acknowledged, but ${count} are in the database.`);
    const statement = await measureStatement(installation.databaseUrl, seated.map(({ seat }) => seat), connections);
    return { saves: median(taken.map((turn) => turn.saves)), bare: median(taken.map((turn) => turn.bare)), ratio: median(taken.map((turn) => turn.saves / turn.bare)), statement, stored: acknowledged };
  } finally {
    await server.end();
    await Promise.all([owner.destroy(), app.destroy()]);
  }
}
