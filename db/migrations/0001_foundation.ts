import { type Kysely, sql } from 'kysely';

/** Roles, the clock, the school, and the append-only log. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create schema if not exists app`.execute(db);
  await sql`
    do $$
    begin
      if not exists (select from pg_roles where rolname = 'fullfield_app') then create role fullfield_app nologin; end if;
      if not exists (select from pg_roles where rolname = 'fullfield_candidate') then create role fullfield_candidate nologin; end if;
    exception when duplicate_object or unique_violation then null;
    end $$`.execute(db);
  await sql`grant fullfield_app, fullfield_candidate to current_user`.execute(db);
  await sql`grant usage on schema public, app to fullfield_app, fullfield_candidate`.execute(db);
  await sql`alter default privileges in schema public grant select, insert, update, delete on tables to fullfield_app`.execute(db);
  await sql`alter default privileges in schema public grant usage, select on sequences to fullfield_app`.execute(db);

  // One row: what kind of installation this is, and how far its clock is shifted.
  await sql`create table app.installation (
    only_one boolean primary key default true check (only_one),
    kind text not null default 'school' check (kind in ('school', 'demo', 'test')),
    clock_shift interval not null default '0',
    constraint shift_only_outside_a_school check (kind <> 'school' or clock_shift = '0')
  )`.execute(db);
  await sql`insert into app.installation default values`.execute(db);
  await sql`create function app.now() returns timestamptz language sql stable as
    'select statement_timestamp() + (select clock_shift from app.installation)'`.execute(db);
  await sql`grant select on app.installation to fullfield_app, fullfield_candidate`.execute(db);
  await sql`grant update (clock_shift) on app.installation to fullfield_app`.execute(db);

  await sql`create function app.refuse_change() returns trigger language plpgsql as $$
    begin raise exception '% is append-only', tg_table_name using errcode = 'integrity_constraint_violation'; end $$`.execute(db);

  await sql`create table school (
    only_one boolean primary key default true check (only_one),
    name text not null,
    settings jsonb not null default '{}',
    version integer not null default 1,
    changed_at timestamptz not null default app.now()
  )`.execute(db);
  await sql`insert into school (name) values ('')`.execute(db);

  // The log: ids and codes only; personal text stands in event_note and can be erased.
  await sql`create table event (
    id bigint generated always as identity primary key,
    at timestamptz not null default app.now(),
    recorded_at timestamptz not null default clock_timestamp(),
    actor_id uuid,
    kind text not null,
    subject text not null,
    subject_id text not null,
    data jsonb not null default '{}',
    -- Binds the erasable words of event_note without holding them.
    note_digest bytea,
    salt bytea not null,
    commitment bytea not null
  )`.execute(db);
  await sql`create index event_subject on event (subject, subject_id, id)`.execute(db);
  await sql`create table event_note (event_id bigint primary key references event, note text not null)`.execute(db);
  await sql`create table event_block (
    number bigint primary key,
    sealed_at timestamptz not null default clock_timestamp(),
    events integer not null,
    previous bytea not null,
    digest bytea not null
  )`.execute(db);
  await sql`create table event_sealed (
    event_id bigint primary key references event,
    block_number bigint not null references event_block,
    place integer not null,
    unique (block_number, place)
  )`.execute(db);
  for (const table of ['event', 'event_block', 'event_sealed']) {
    await sql`create trigger append_only before update or delete on ${sql.table(table)} for each statement execute function app.refuse_change()`.execute(db);
    await sql`revoke update, delete, truncate on ${sql.table(table)} from fullfield_app`.execute(db);
  }
}
