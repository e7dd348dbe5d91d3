import { type Kysely, sql } from 'kysely';

/** Exams and the forms frozen from them. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table exam (
    id uuid primary key default gen_random_uuid(),
    title text not null,
    state text not null default 'draft' check (state in ('draft', 'in review', 'approved', 'retired')),
    -- Sections, chosen templates with marks, cover page, pass rule, materials: lib/exams/model.ts.
    content jsonb not null,
    revision integer not null default 1,
    owner_id uuid not null references account,
    review_asked_by uuid references account,
    review_note text not null default '',
    -- Who wrote on it since its last approval: none of them may approve it.
    writers uuid[] not null default '{}',
    changed_by uuid not null references account,
    changed_at timestamptz not null default app.now(),
    created_at timestamptz not null default app.now()
  )`.execute(db);
  await sql`create table form (
    id uuid primary key default gen_random_uuid(),
    exam_id uuid not null references exam,
    number integer not null,
    title text not null,
    content jsonb not null,
    marks numeric(7,1) not null,
    -- Time allowed.
    minutes integer not null,
    approved_by uuid not null references account,
    approved_at timestamptz not null default app.now(),
    digest text not null,
    unique (exam_id, number)
  )`.execute(db);
  await sql`create table form_item (
    form_id uuid not null references form,
    question integer not null,
    section integer not null,
    template_version_id uuid not null references template_version,
    primary key (form_id, question)
  )`.execute(db);
  await sql`create index form_item_version on form_item (template_version_id)`.execute(db);
  for (const table of ['form', 'form_item']) {
    await sql`create trigger unchangeable before update or delete on ${sql.table(table)} for each row execute function app.refuse_change()`.execute(db);
    await sql`revoke update, delete, truncate on ${sql.table(table)} from fullfield_app`.execute(db);
  }
}
