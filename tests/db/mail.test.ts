import net from 'node:net';
import { randomUUID } from 'node:crypto';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { queueMail, sendAgain } from '@/lib/mail/commands';
import { sendMail } from '@/lib/mail/send';
import { openTestDatabase, type TestDatabase } from '@/tests/support/database';
import { startTestSink, type TestSink } from '@/tests/support/sink';

let database: TestDatabase;
let sink: TestSink;
beforeAll(async () => {
  database = await openTestDatabase();
  sink = await startTestSink();
});
afterAll(async () => {
  await sink.close();
  await database.close();
});

const letter = { kind: 'sitting', subject: 'Sitting on Thursday', body: 'Bay 2, 09:00.\nBring a pencil: Ω and √ stay whole.' } as const;

async function queued(to: string, more: object = {}): Promise<string> {
  const result = await queueMail(database.app, { ...letter, to, ...more });
  if (!result.ok) throw new Error(result.says);
  return result.value.mailId;
}
const stateOf = (id: string) => database.app.selectFrom('mail').select(['state', 'attempts', 'says', 'body', 'message_id']).where('id', '=', id).executeTakeFirstOrThrow();

/** A server that takes a message up to its last dot and then cuts the line, as a crash does. */
async function startCutter(): Promise<{ url: string; close(): void }> {
  const server = net.createServer((socket) => {
    let inData = false;
    socket.on('error', () => undefined);
    socket.write('220 ready\r\n');
    socket.on('data', (chunk) => {
      const text = chunk.toString();
      if (inData) return void (text.endsWith('\r\n.\r\n') && socket.destroy());
      inData = /^DATA/im.test(text);
      socket.write(inData ? '354 go on\r\n' : '250 ok\r\n');
    });
  });
  await new Promise<void>((resolve) => server.listen(0, '127.0.0.1', resolve));
  return { url: `smtp://127.0.0.1:${(server.address() as net.AddressInfo).port}`, close: () => void server.close() };
}

describe('a message', () => {
  it('arrives with its text, its Message-ID and its attachment, once', async () => {
    const attach = [{ name: 'sitting.ics', type: 'text/calendar', text: 'BEGIN:VCALENDAR' }];
    const id = await queued('ana@example.org', { attach, once: 'sitting 1' });
    await sendMail(database.app, sink.url, id);
    await sendMail(database.app, sink.url, id);
    const sent = await stateOf(id);
    expect(sent).toMatchObject({ state: 'accepted', attempts: 1 });
    const arrived = sink.received.filter((mail) => mail.to === 'ana@example.org');
    expect(arrived).toHaveLength(1);
    expect(arrived[0]).toMatchObject({ subject: letter.subject, messageId: sent.message_id });
    expect(arrived[0]?.text.trim()).toBe(letter.body);
    expect(arrived[0]?.raw.toString()).toContain('filename=sitting.ics');
  });

  it('of one thing to one person is queued once', async () => {
    await queued('ben@example.org', { once: 'report 7 issue 1' });
    expect(await queueMail(database.app, { ...letter, to: 'BEN@example.org'.toLowerCase(), once: 'report 7 issue 1' })).toMatchObject({ ok: false, code: 'sent-before' });
    await queued('ben@example.org', { once: 'report 7 issue 2' });
  });

  it('exists only when the transaction commits, and so does its job', async () => {
    const to = `${randomUUID()}@example.org`;
    await database.app
      .transaction()
      .execute(async (trx) => {
        await queueMail(trx, { ...letter, to });
        throw new Error('changed my mind');
      })
      .catch(() => undefined);
    expect(await database.app.selectFrom('mail').select('id').where('to_address', '=', to).execute()).toEqual([]);
  });

  it('is refused when its address or subject holds a line break', async () => {
    for (const bad of [{ to: 'a@example.org\r\nBcc: all@example.org' }, { to: 'a@example.org', subject: 'Hello\nBcc: all@example.org' }]) {
      expect(await queueMail(database.app, { ...letter, ...bad })).toMatchObject({ ok: false, code: 'invalid' });
    }
  });

  it('with a personal link loses its text once it was taken', async () => {
    const id = await queued('cy@example.org', { kind: 'reset', body: 'https://exams.example.org/reset/secret' });
    await sendMail(database.app, sink.url, id);
    expect((await stateOf(id)).body).not.toContain('secret');
    expect(sink.received.at(-1)?.text).toContain('secret');
  });
});

describe('trouble', () => {
  it('is tried again after a temporary refusal and with no server, failed after a final one', async () => {
    const [busy, none, nobody] = [await queued('busy@example.org'), await queued('d@example.org'), await queued('nobody@example.org')];
    await sendMail(database.app, sink.url, busy);
    await sendMail(database.app, 'smtp://127.0.0.1:9', none);
    await sendMail(database.app, sink.url, nobody);
    expect(await stateOf(busy)).toMatchObject({ state: 'queued', attempts: 1, says: expect.stringContaining('451') });
    expect(await stateOf(none)).toMatchObject({ state: 'queued', attempts: 1 });
    expect(await stateOf(nobody)).toMatchObject({ state: 'failed', says: expect.stringContaining('550') });
  });

  it('is unsure when the line was cut after the text, and then sent again only when asked, under the same Message-ID', async () => {
    const cutter = await startCutter();
    const id = await queued('eve@example.org');
    await sendMail(database.app, cutter.url, id);
    cutter.close();
    expect(await stateOf(id)).toMatchObject({ state: 'unsure' });
    await sendMail(database.app, sink.url, id);
    expect(sink.received.filter((mail) => mail.to === 'eve@example.org')).toEqual([]);
    expect(await sendAgain(database.app, id)).toMatchObject({ ok: true });
    await sendMail(database.app, sink.url, id);
    const arrived = sink.received.filter((mail) => mail.to === 'eve@example.org');
    expect(arrived.map((mail) => mail.messageId)).toEqual([(await stateOf(id)).message_id]);
  });

  it('is unsure when the program stopped while sending', async () => {
    const id = await queued('flo@example.org');
    await database.app.updateTable('mail').set({ state: 'sending', attempts: 1 }).where('id', '=', id).execute();
    await database.app.insertInto('mail_attempt').values({ mail_id: id, number: 1 }).execute();
    await sendMail(database.app, sink.url, id);
    expect(await stateOf(id)).toMatchObject({ state: 'unsure' });
    expect(sink.received.filter((mail) => mail.to === 'flo@example.org')).toEqual([]);
  });
});
