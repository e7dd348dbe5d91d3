import { type Kysely, sql } from 'kysely';

/** Sittings, candidates, papers and what they answer. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table sitting (
    id uuid primary key default gen_random_uuid(),
    form_id uuid not null references form,
    class_id uuid not null references class,
    title text not null,
    room text not null,
    state text not null default 'planned'
      check (state in ('planned', 'check-in', 'running', 'paused', 'closed', 'reconciled', 'cancelled', 'abandoned')),
    opens_at timestamptz not null,
    starts_at timestamptz not null,
    latest_start_at timestamptz not null,
    minutes integer not null check (minutes between 1 and 600),
    locale text not null,
    -- Seeds derive from it; it never leaves the server.
    secret bytea not null,
    papers text not null default 'none' check (papers in ('none', 'drawing', 'drawn', 'failed')),
    papers_drawn integer not null default 0,
    papers_says text not null default '',
    started_at timestamptz,
    paused_at timestamptz,
    closed_at timestamptz,
    reconciled_at timestamptz,
    reconciled_by uuid references account,
    released_at timestamptz,
    -- Numbers the sitting's events under its row lock, so that a later number always commits later.
    counter bigint not null default 0,
    created_by uuid not null references account,
    created_at timestamptz not null default app.now(),
    check (opens_at <= starts_at and starts_at <= latest_start_at)
  )`.execute(db);
  await sql`create index sitting_class on sitting (class_id)`.execute(db);
  await sql`create table sitting_proctor (
    sitting_id uuid not null references sitting on delete cascade,
    account_id uuid not null references account,
    primary key (sitting_id, account_id)
  )`.execute(db);
  await sql`create table candidate (
    id uuid primary key default gen_random_uuid(),
    sitting_id uuid not null references sitting,
    account_id uuid not null references account,
    seat text not null default '',
    state text not null default 'expected' check (state in
      ('expected', 'admitted', 'writing', 'paused', 'on rest break', 'handed in', 'timed out', 'withdrawn', 'absent', 'refused')),
    -- The seat token carries it; raising it ends what an older token may do.
    epoch integer not null default 1,
    device text not null default '',
    -- Time allowed to this candidate, accommodations and time added included.
    seconds_allowed integer not null,
    need text not null default '',
    rest_seconds_allowed integer not null default 0,
    rest_seconds_used integer not null default 0,
    rest_began_at timestamptz,
    admitted_at timestamptz,
    declared_at timestamptz,
    started_at timestamptz,
    -- While the clock runs ends_at is set; while it is stopped seconds_left is.
    ends_at timestamptz,
    seconds_left numeric(12,3),
    ended_at timestamptz,
    -- Questions answered, last sign of life: what the board shows.
    answered integer not null default 0,
    heard_at timestamptz,
    rehearsed_at timestamptz,
    note text not null default '',
    unique (sitting_id, account_id),
    check (ends_at is null or seconds_left is null)
  )`.execute(db);
  await sql`create index candidate_account on candidate (account_id)`.execute(db);
  await sql`create index candidate_due on candidate (ends_at) where state = 'writing'`.execute(db);

  await sql`create table paper (
    candidate_id uuid primary key references candidate,
    form_id uuid not null references form,
    engine text not null,
    locale text not null,
    questions integer not null,
    parts integer not null,
    -- What a candidate may see: values, printed text, options. Never a key.
    content jsonb not null,
    digest text not null,
    drawn_at timestamptz not null default app.now()
  )`.execute(db);
  // In a table of its own: the candidate's database role has no grant on it.
  await sql`create table paper_key (
    candidate_id uuid not null references candidate,
    question integer not null,
    template_version_id uuid not null references template_version,
    seed text not null,
    draw jsonb not null,
    primary key (candidate_id, question)
  )`.execute(db);
  // A paper nobody has seen may be discarded: the sitting is still planned. After that it never changes.
  await sql`create function app.keep_paper() returns trigger language plpgsql as $$
    begin
      if tg_op = 'DELETE' and exists (
        select from candidate c join sitting s on s.id = c.sitting_id
        where c.id = old.candidate_id and c.admitted_at is null and s.state = 'planned'
      ) then return old; end if;
      raise exception '% is unchangeable once check-in is open', tg_table_name using errcode = 'integrity_constraint_violation';
    end $$`.execute(db);
  for (const table of ['paper', 'paper_key']) {
    await sql`create trigger unchangeable before update or delete on ${sql.table(table)} for each row execute function app.keep_paper()`.execute(db);
    await sql`revoke update, truncate on ${sql.table(table)} from fullfield_app`.execute(db);
  }

  // Every revision is kept. The last sequence of a part counts, in whatever order they arrive.
  await sql`create table response (
    candidate_id uuid not null references candidate,
    question integer not null,
    part text not null,
    sequence bigint not null,
    answer text not null check (length(answer) <= 200),
    device text not null default '',
    at timestamptz not null,
    recorded_at timestamptz not null default clock_timestamp(),
    primary key (candidate_id, question, part, sequence)
  )`.execute(db);
  await sql`create trigger append_only before update or delete on response for each row execute function app.refuse_change()`.execute(db);
  await sql`revoke update, delete, truncate on response from fullfield_app`.execute(db);
  await sql`create table candidate_flag (
    candidate_id uuid not null references candidate,
    question integer not null,
    sequence bigint not null,
    flagged boolean not null,
    primary key (candidate_id, question)
  )`.execute(db);
  // What arrived after the end but says it was typed before: a claim, decided by a person.
  await sql`create table claim (
    candidate_id uuid not null references candidate,
    question integer not null,
    part text not null,
    sequence bigint not null,
    answer text not null check (length(answer) <= 200),
    typed_at timestamptz,
    received_at timestamptz not null default app.now(),
    decision text check (decision in ('taken', 'left out')),
    decided_by uuid references account,
    decided_at timestamptz,
    reason text not null default '',
    primary key (candidate_id, question, part, sequence)
  )`.execute(db);
  await sql`create table incident (
    id uuid primary key default gen_random_uuid(),
    sitting_id uuid not null references sitting,
    candidate_id uuid references candidate,
    at timestamptz not null default app.now(),
    recorded_at timestamptz not null default clock_timestamp(),
    noted_by uuid not null references account,
    words text not null
  )`.execute(db);
  await sql`create trigger append_only before update or delete on incident for each row execute function app.refuse_change()`.execute(db);
  await sql`revoke update, delete, truncate on incident from fullfield_app`.execute(db);
  // A candidate's call for help: open until a proctor answers it.
  await sql`create table help_call (
    id uuid primary key default gen_random_uuid(),
    candidate_id uuid not null references candidate,
    at timestamptz not null default app.now(),
    answered_at timestamptz,
    answered_by uuid references account
  )`.execute(db);
  // The sitting's own time line, numbered by sitting.counter.
  await sql`create table sitting_event (
    sitting_id uuid not null references sitting,
    number bigint not null,
    at timestamptz not null default app.now(),
    kind text not null,
    candidate_id uuid references candidate,
    actor_id uuid references account,
    data jsonb not null default '{}',
    primary key (sitting_id, number)
  )`.execute(db);
  await sql`create index sitting_event_candidate on sitting_event (candidate_id)`.execute(db);
  await sql`create trigger append_only before update or delete on sitting_event for each row execute function app.refuse_change()`.execute(db);
  await sql`revoke update, delete, truncate on sitting_event from fullfield_app`.execute(db);
  // One-time codes on printed slips, for people without e-mail.
  await sql`create table slip (
    id uuid primary key default gen_random_uuid(),
    sitting_id uuid references sitting,
    account_id uuid not null references account,
    code_hash bytea not null unique,
    made_at timestamptz not null default app.now(),
    expires_at timestamptz not null,
    used_at timestamptz
  )`.execute(db);

  // What a candidate's requests may touch, and nothing else.
  await sql`grant select (settings) on school to fullfield_candidate`.execute(db);
  await sql`grant select on sitting_event, paper, response, candidate_flag, form to fullfield_candidate`.execute(db);
  await sql`grant select (id, sitting_id, account_id, seat, state, epoch, device, seconds_allowed, need, rest_seconds_allowed, rest_seconds_used,
    rest_began_at, admitted_at, declared_at, started_at, ends_at, seconds_left, ended_at, answered, heard_at) on candidate to fullfield_candidate`.execute(db);
  await sql`grant update (heard_at, answered) on candidate to fullfield_candidate`.execute(db);
  await sql`grant select (id, form_id, title, room, state, opens_at, starts_at, latest_start_at, minutes, locale, started_at, paused_at, closed_at)
    on sitting to fullfield_candidate`.execute(db);
  await sql`grant insert on response, claim, candidate_flag to fullfield_candidate`.execute(db);
  await sql`grant select on claim, help_call to fullfield_candidate`.execute(db);
  await sql`grant update (sequence, flagged) on candidate_flag to fullfield_candidate`.execute(db);
}
