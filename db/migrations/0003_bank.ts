import { type Kysely, sql } from 'kysely';

/** Templates, their unchangeable versions, checks and reviews. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table template (
    id uuid primary key default gen_random_uuid(),
    slug text not null unique,
    state text not null default 'draft' check (state in ('draft', 'in review', 'approved', 'retired')),
    -- The working text, always kept as typed, even when it does not parse.
    text text not null,
    revision integer not null default 1,
    title text not null,
    area text not null default '',
    level integer,
    minutes numeric(5,1),
    marks numeric(6,1),
    kinds text[] not null default '{}',
    cautions text[] not null default '{}',
    owner_id uuid references account,
    -- Everybody who saved a text since the last approval: none of them may approve it.
    writers uuid[] not null default '{}',
    changed_by uuid references account,
    changed_at timestamptz not null default app.now(),
    created_at timestamptz not null default app.now()
  )`.execute(db);
  await sql`create table template_version (
    id uuid primary key default gen_random_uuid(),
    template_id uuid not null references template,
    number integer not null,
    text text not null,
    -- SHA-256 of text, tables, cautions, figures and engine: what an old paper is rebuilt from.
    digests jsonb not null,
    engine text not null,
    title text not null,
    area text not null,
    level integer not null,
    minutes numeric(5,1) not null,
    marks numeric(6,1) not null,
    kinds text[] not null,
    author_id uuid not null references account,
    writers uuid[] not null,
    made_at timestamptz not null default app.now(),
    unique (template_id, number)
  )`.execute(db);
  await sql`create trigger unchangeable before update or delete on template_version for each row execute function app.refuse_change()`.execute(db);
  await sql`revoke update, delete, truncate on template_version from fullfield_app`.execute(db);
  // in review -> approved | returned; an approved one is later retired or replaced by the next.
  await sql`create table template_review (
    version_id uuid primary key references template_version,
    asked_by uuid not null references account,
    asked_at timestamptz not null default app.now(),
    ask_note text not null default '',
    verdict text check (verdict in ('approved', 'returned', 'taken back')),
    decided_by uuid references account,
    decided_at timestamptz,
    note text not null default '',
    retired_at timestamptz,
    check ((verdict is null) = (decided_by is null)),
    check (verdict is null or verdict = 'taken back' or decided_by <> asked_by)
  )`.execute(db);
  await sql`create table template_check (
    id uuid primary key default gen_random_uuid(),
    template_id uuid not null references template,
    -- SHA-256 of the text with the tables, cautions and engine it was checked with.
    text_digest text not null,
    text text not null,
    draws integer not null,
    done integer not null default 0,
    state text not null default 'queued' check (state in ('queued', 'running', 'in order', 'problems', 'cancelled', 'failed')),
    report jsonb,
    says text not null default '',
    asked_by uuid references account,
    asked_at timestamptz not null default app.now(),
    ended_at timestamptz
  )`.execute(db);
  await sql`create index template_check_template on template_check (template_id, asked_at desc)`.execute(db);
}
