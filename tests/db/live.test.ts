import { sql } from 'kysely';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { closeListener, subscribe } from '@/lib/live/listener';
import { postChangeIn, postSaved, savesTopic, sittingTopic } from '@/lib/live/post';
import { closeStreams, eventStream, type StreamEvent } from '@/lib/live/stream';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';
import { until } from '@/tests/support/wait';

let database: TestDatabase;
beforeAll(async () => void (database = await openTestDatabase()));
afterAll(async () => {
  await closeListener();
  await database.close();
});

const aborts: AbortController[] = [];
afterEach(() => aborts.splice(0).forEach((abort) => abort.abort()));

/** Opens a stream as a browser does and gathers what it says. */
function open(read: (since: string | null) => Promise<readonly StreamEvent[] | 'end'>, lastEventId?: string) {
  const abort = new AbortController();
  aborts.push(abort);
  const headers = new Headers(lastEventId === undefined ? {} : { 'last-event-id': lastEventId });
  const response = eventStream(new Request('http://127.0.0.1/', { headers, signal: abort.signal }), { topics: [sittingTopic('s1'), savesTopic('s1')], read });
  const heard = { text: '', ended: false };
  void (async () => {
    const text = new TextDecoder();
    for await (const piece of response.body as unknown as AsyncIterable<Uint8Array>) heard.text += text.decode(piece);
    heard.ended = true;
  })();
  return { heard, abort };
}

const listening = () =>
  until(async () => (await sql`select from pg_stat_activity where application_name = 'fullfield listener' and datname = current_database()`.execute(database.owner)).rows.length === 1);

describe('a stream', () => {
  it('sends what is there, reads anew at each change, and goes on after the last id that a browser names', async () => {
    const asked: (string | null)[] = [];
    let state = 1;
    const { heard } = open(async (since) => {
      asked.push(since);
      return since === String(state) ? [] : [{ id: String(state), event: 'board', data: { state } }];
    }, '7');
    await until(async () => heard.text.includes('id: 1\nevent: board\ndata: {"state":1}\n\n'));
    expect(asked[0]).toBe('7');
    await listening();
    state = 2;
    await database.app.transaction().execute((trx) => postChangeIn(trx, 's1'));
    await until(async () => heard.text.includes('{"state":2}'));
  });

  it('ends when the reader may not see it any more', async () => {
    let allowed = true;
    const { heard } = open(async () => (allowed ? [] : 'end'));
    await listening();
    allowed = false;
    postSaved('s1');
    await until(async () => heard.ended);
  });

  it('makes good what it missed while the database was away', async () => {
    let state = 1;
    const { heard } = open(async () => [{ event: 'board', data: { state } }]);
    await listening();
    state = 2;
    await sql`select pg_terminate_backend(pid) from pg_stat_activity where application_name = 'fullfield listener' and datname = current_database()`.execute(database.owner);
    await until(async () => heard.text.includes('{"state":2}'));
  });
});

describe('posts about saved answers', () => {
  it('are at most four a second, and the last one is never lost', async () => {
    let wakes = 0;
    const end = subscribe(savesTopic('s2'), () => void (wakes += 1));
    await listening();
    await until(async () => (postSaved('s2'), wakes > 0));
    wakes = 0;
    const began = performance.now();
    for (let n = 0; n < 200; n += 1) {
      postSaved('s2');
      await new Promise((resolve) => setTimeout(resolve, 5));
    }
    await new Promise((resolve) => setTimeout(resolve, 600));
    const seconds = (performance.now() - began) / 1000;
    expect(wakes).toBeGreaterThan(0);
    expect(wakes).toBeLessThanOrEqual(Math.ceil(seconds * 4) + 2);
    end();
  });
});

describe('a server that stops', () => {
  it('ends its streams at once and opens none', async () => {
    const { heard } = open(async () => []);
    await until(async () => heard.text.startsWith('retry:'));
    closeStreams();
    await until(async () => heard.ended, 1);
    expect(eventStream(new Request('http://127.0.0.1/'), { topics: [], read: async () => [] }).status).toBe(503);
  });
});
