import { type Kysely, sql } from 'kysely';

/** Accounts, sign-in, terms, classes, enrolment, accommodations. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table account (
    id uuid primary key default gen_random_uuid(),
    name text not null check (length(name) between 1 and 120),
    sort_name text not null,
    email text check (email = lower(email)),
    learner_number text,
    password_hash text,
    state text not null default 'invited' check (state in ('invited', 'active', 'closed')),
    -- Raised when the account closes, its roles change or it signs out everywhere: older sign-ins end at once.
    epoch integer not null default 1,
    theme text not null default 'system' check (theme in ('system', 'light', 'dark')),
    created_at timestamptz not null default app.now(),
    changed_at timestamptz not null default app.now(),
    check (email is not null or learner_number is not null)
  )`.execute(db);
  await sql`create unique index account_email on account (email)`.execute(db);
  await sql`create unique index account_learner_number on account (lower(learner_number))`.execute(db);
  await sql`create table account_role (
    account_id uuid not null references account on delete cascade,
    role text not null check (role in ('instructor', 'student', 'proctor', 'registrar')),
    primary key (account_id, role)
  )`.execute(db);
  await sql`create table sign_in (
    id uuid primary key default gen_random_uuid(),
    account_id uuid not null references account on delete cascade,
    epoch integer not null,
    began_at timestamptz not null default app.now(),
    ended_at timestamptz,
    device text not null default ''
  )`.execute(db);
  await sql`create index sign_in_account on sign_in (account_id) where ended_at is null`.execute(db);
  // Slows guessing: one row an account or an address, never a lock.
  await sql`create table sign_in_delay (
    key text primary key,
    failures integer not null,
    last_at timestamptz not null,
    free_at timestamptz not null
  )`.execute(db);
  await sql`create table account_link (
    id uuid primary key default gen_random_uuid(),
    account_id uuid not null references account on delete cascade,
    purpose text not null check (purpose in ('invitation', 'reset')),
    token_hash bytea not null unique,
    made_at timestamptz not null default app.now(),
    expires_at timestamptz not null,
    used_at timestamptz
  )`.execute(db);

  await sql`create table term (
    id uuid primary key default gen_random_uuid(),
    name text not null unique,
    starts_on date not null,
    ends_on date not null,
    state text not null default 'open' check (state in ('open', 'ended')),
    check (ends_on >= starts_on)
  )`.execute(db);
  await sql`create table class (
    id uuid primary key default gen_random_uuid(),
    term_id uuid not null references term,
    name text not null,
    title text not null default '',
    unique (term_id, name)
  )`.execute(db);
  await sql`create table class_instructor (
    class_id uuid not null references class on delete cascade,
    account_id uuid not null references account,
    primary key (class_id, account_id)
  )`.execute(db);
  await sql`create table enrolment (
    class_id uuid not null references class,
    account_id uuid not null references account,
    since date not null default (app.now())::date,
    until date,
    primary key (class_id, account_id)
  )`.execute(db);
  await sql`create index enrolment_account on enrolment (account_id)`.execute(db);
  // The need is shown to a proctor; the reason only to a registrar.
  await sql`create table accommodation (
    id uuid primary key default gen_random_uuid(),
    account_id uuid not null references account,
    extra_percent numeric(5,1) not null default 0 check (extra_percent between 0 and 300),
    extra_minutes integer not null default 0 check (extra_minutes between 0 and 600),
    rest_minutes integer not null default 0 check (rest_minutes between 0 and 240),
    large_print boolean not null default false,
    separate_room boolean not null default false,
    reason text not null default '',
    since date not null,
    until date,
    given_by uuid not null references account,
    given_at timestamptz not null default app.now(),
    ended_at timestamptz
  )`.execute(db);
  await sql`create index accommodation_account on accommodation (account_id)`.execute(db);
  // A roster that was read and previewed, kept until it is taken or dropped.
  await sql`create table roster_import (
    id uuid primary key default gen_random_uuid(),
    class_id uuid references class,
    made_by uuid not null references account,
    made_at timestamptz not null default app.now(),
    file_name text not null,
    rows jsonb not null,
    problems jsonb not null,
    state text not null default 'previewed' check (state in ('previewed', 'taken', 'dropped'))
  )`.execute(db);
}
