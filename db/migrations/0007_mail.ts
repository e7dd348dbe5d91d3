import { type Kysely, sql } from 'kysely';

/** E-mail going out, and the local sink that receives it where no server is given. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table mail (
    id uuid primary key default gen_random_uuid(),
    kind text not null,
    account_id uuid references account,
    report_id uuid references report,
    sitting_id uuid references sitting,
    to_address text not null,
    subject text not null,
    body text not null,
    -- Files are made when the message is sent, from what this names.
    attach jsonb not null default '[]',
    -- One a report issue and recipient: sending again is recognised by the receiver.
    message_id text not null unique,
    state text not null default 'queued' check (state in ('queued', 'sending', 'accepted', 'failed', 'unsure', 'delivered')),
    attempts integer not null default 0,
    next_at timestamptz not null default app.now(),
    says text not null default '',
    made_by uuid references account,
    made_at timestamptz not null default app.now(),
    changed_at timestamptz not null default app.now()
  )`.execute(db);
  await sql`create index mail_due on mail (next_at) where state = 'queued'`.execute(db);
  await sql`create table mail_attempt (
    mail_id uuid not null references mail,
    number integer not null,
    began_at timestamptz not null default app.now(),
    ended_at timestamptz,
    outcome text check (outcome in ('accepted', 'failed', 'unsure')),
    says text not null default '',
    primary key (mail_id, number)
  )`.execute(db);
  await sql`create table sink_mail (
    id bigint generated always as identity primary key,
    received_at timestamptz not null default clock_timestamp(),
    from_address text not null,
    to_address text not null,
    subject text not null,
    text_body text not null,
    message_id text not null,
    raw bytea not null
  )`.execute(db);
}
