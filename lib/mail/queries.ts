import { simpleParser } from 'mailparser';
import type { Database } from '@/db/client';
import type { InstallationKind } from '@/lib/config';
import { done, notFound, type Result } from '@/lib/result';

/** The sink's mail is open to everybody at the machine, so it is shown where no real person's mail can be: demo and tests. */
const shown = (kind: InstallationKind): boolean => kind !== 'school';

export type SunkMail = { id: number; at: Date; to: string; subject: string };

/** What the local mail sink received, newest first, at most 500. */
export async function listSunkMail(db: Database, kind: InstallationKind): Promise<Result<SunkMail[]>> {
  if (!shown(kind)) return notFound();
  const rows = await db
    .selectFrom('sink_mail')
    .select(['id', 'received_at as at', 'to_address as to', 'subject'])
    .orderBy('id', 'desc')
    .limit(500)
    .execute();
  return done(rows);
}

export type SunkLetter = SunkMail & { from: string; text: string; messageId: string; files: { name: string; type: string; bytes: number }[] };

const parse = async (db: Database, id: number) => {
  if (!Number.isSafeInteger(id) || id < 1) return undefined;
  const row = await db.selectFrom('sink_mail').selectAll().where('id', '=', id).executeTakeFirst();
  return row && { row, mail: await simpleParser(row.raw) };
};

/** One message of the sink with its text and the names of its files. */
export async function readSunkMail(db: Database, kind: InstallationKind, id: number): Promise<Result<SunkLetter>> {
  const found = shown(kind) ? await parse(db, id) : undefined;
  if (!found) return notFound();
  const { row, mail } = found;
  return done({
    id: row.id,
    at: row.received_at,
    to: row.to_address,
    subject: row.subject,
    from: mail.from?.text ?? row.from_address,
    text: mail.text ?? '',
    messageId: row.message_id,
    files: mail.attachments.map((file) => ({ name: file.filename ?? 'file', type: file.contentType, bytes: file.size })),
  });
}

/** The `place`-th file of a message, from 0. */
export async function readSunkFile(db: Database, kind: InstallationKind, id: number, place: number): Promise<Result<{ name: string; type: string; content: Buffer }>> {
  const found = shown(kind) ? await parse(db, id) : undefined;
  const file = found?.mail.attachments[place];
  return file ? done({ name: file.filename ?? 'file', type: file.contentType, content: file.content }) : notFound();
}
