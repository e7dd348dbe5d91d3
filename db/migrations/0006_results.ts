import { type Kysely, sql } from 'kysely';

/** Marks, results, grade reports. */
export async function up(db: Kysely<unknown>): Promise<void> {
  // Every marking of a part is kept; the highest issue counts.
  await sql`create table mark (
    candidate_id uuid not null references candidate,
    question integer not null,
    part text not null,
    issue integer not null,
    -- Below zero only where the exam takes marks away for a wrong option.
    awarded numeric(6,2) not null,
    of numeric(6,2) not null,
    verdict text not null check (verdict in ('correct', 'carried', 'misstep', 'wrong', 'blank', 'unread', 'for-marker')),
    rule text not null,
    answer text not null,
    reads jsonb,
    key jsonb not null,
    says text not null default '',
    -- Null when the marking was automatic.
    marker_id uuid references account,
    reason text not null default '',
    at timestamptz not null default app.now(),
    primary key (candidate_id, question, part, issue),
    check (abs(awarded) <= of),
    check (marker_id is null or reason <> '')
  )`.execute(db);
  await sql`create table result (
    candidate_id uuid not null references candidate,
    issue integer not null,
    state text not null check (state in ('provisional', 'moderated', 'released', 'sealed', 'amended')),
    withheld boolean not null default false,
    total numeric(8,2) not null,
    of numeric(8,2) not null,
    percent numeric(6,2) not null,
    outcome text not null check (outcome in ('pass', 'not passed', 'absent', 'second marker', 'withheld')),
    breakdown jsonb not null,
    rule jsonb not null,
    why text not null default '',
    made_by uuid references account,
    at timestamptz not null default app.now(),
    primary key (candidate_id, issue)
  )`.execute(db);
  await sql`create table report (
    id uuid primary key default gen_random_uuid(),
    candidate_id uuid not null references candidate,
    result_issue integer not null,
    issue integer not null,
    code text not null unique,
    -- What the document says, as printed, and the SHA-256 of it that the document carries.
    content jsonb not null,
    digest text not null,
    pdf bytea not null,
    made_by uuid not null references account,
    at timestamptz not null default app.now(),
    foreign key (candidate_id, result_issue) references result (candidate_id, issue),
    unique (candidate_id, issue)
  )`.execute(db);
  for (const table of ['mark', 'result', 'report']) {
    await sql`create trigger append_only before update or delete on ${sql.table(table)} for each row execute function app.refuse_change()`.execute(db);
    await sql`revoke update, delete, truncate on ${sql.table(table)} from fullfield_app`.execute(db);
  }
}
