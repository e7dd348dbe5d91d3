import { readFileSync } from 'node:fs';
import autocannon from 'autocannon';
import { openDatabase } from '@/db/client';
import { makeRunningRoom, seatCookieOf } from '../support/running-room';
import { prepareTemplate } from '../support/cluster';
import { type Installation, startApp } from '../support/app';
import { measureStatement } from './statement';

/**
 * Requests a second of one server process over ten connections: saves of one answer, each durable before it is acknowledged, and
 * the bare handler, which does nothing; in turns, so that both meet the same machine. `ratio` is the median over the turns.
 * `statement`: the same statement a second, sent by pgbench over ten connections. `work`: time of the processor that the server process
 * itself takes for a request [ms], which says the same on a machine that is busy with other things.
 */
export interface SaveMeasure { saves: number; bare: number; ratio: number; statement: number; stored: number; work: { save: number; bare: number } }

const candidates = 30;
const connections = 10;

type Load = { path: () => string; cookie: () => string; body: () => string; answered: (status: number, body: string) => void };

/** Time of the processor that a process has used so far [ms], from /proc: 100 ticks a second. */
function processorTime(pid: number): number {
  const stat = readFileSync(`/proc/${pid}/stat`, 'utf8');
  const [user, system] = stat.slice(stat.lastIndexOf(')') + 2).split(' ').slice(11, 13).map(Number);
  return ((user ?? 0) + (system ?? 0)) * 10;
}

type Taken = { rate: number; work: number };

async function load({ url, pid }: { url: string; pid: number }, seconds: number, { path, cookie, body, answered }: Load): Promise<Taken> {
  const before = processorTime(pid);
  const result = await autocannon({
    url, connections, duration: seconds,
    requests: [{
      method: 'POST',
      setupRequest: (request) => ({ ...request, path: path(), headers: { ...request.headers, 'content-type': 'application/json', cookie: cookie() }, body: body() }),
      onResponse: answered,
    }],
  });
  if (result.errors > 0 || result.non2xx > 0) throw new Error(`${result.errors} errors and ${result.non2xx} refusals while measuring ${url}${path()}.`);
  return { rate: result['2xx'] / result.duration, work: (processorTime(pid) - before) / result['2xx'] };
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
    await load(server, 3, save);
    await load(server, 3, nothing);
    const taken: { save: Taken; bare: Taken }[] = [];
    for (let turn = 0; turn < turns; turn += 1) taken.push({ save: await load(server, seconds, save), bare: await load(server, seconds, nothing) });
    const { count } = await owner.selectFrom('response').select((of) => of.fn.countAll<number>().as('count')).executeTakeFirstOrThrow();
    if (count < acknowledged) throw new Error(`${acknowledged} saves were acknowledged, but ${count} are in the database.`);
    const statement = await measureStatement(installation.databaseUrl, seated.map(({ seat }) => seat), connections);
    const middle = (of: (turn: { save: Taken; bare: Taken }) => number) => median(taken.map(of));
    return {
      saves: middle((turn) => turn.save.rate), bare: middle((turn) => turn.bare.rate), ratio: middle((turn) => turn.save.rate / turn.bare.rate), statement, stored: acknowledged,
      work: { save: middle((turn) => turn.save.work), bare: middle((turn) => turn.bare.work) },
    };
  } finally {
    await server.end();
    await Promise.all([owner.destroy(), app.destroy()]);
  }
}
