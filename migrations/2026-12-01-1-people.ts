import { type Kysely, sql } from 'kysely'

/** Organisations, the people in them, and the attempts to sign in. */
export async function up(db: Kysely<unknown>): Promise<void> {
  // What the policies read; `withOrganisation` and `withUser` set it for one transaction.
  await sql`create function halfsplit_organisation() returns uuid language sql stable
    as $$ select nullif(current_setting('halfsplit.organisation', true), '')::uuid $$`.execute(db)
  await sql`create function halfsplit_user() returns uuid language sql stable
    as $$ select nullif(current_setting('halfsplit.user', true), '')::uuid $$`.execute(db)

  await sql`create table organisations (
    id uuid primary key,
    name text not null check (name <> ''),
    kind text not null check (kind in ('shop', 'school', 'both')),
    created_at timestamptz not null default now()
  )`.execute(db)
  await sql`create table users (
    id uuid primary key,
    email text not null unique check (email = lower(email)),
    name text not null,
    password_hash text not null,
    created_at timestamptz not null default now()
  )`.execute(db)
  await sql`create table memberships (
    organisation_id uuid not null references organisations (id) on delete cascade,
    user_id uuid not null references users (id) on delete cascade,
    role text not null check (role in ('owner', 'instructor', 'technician', 'student')),
    created_at timestamptz not null default now(),
    primary key (organisation_id, user_id)
  )`.execute(db)
  await sql`create index memberships_by_user on memberships (user_id)`.execute(db)
  await sql`create table sign_in_attempts (
    id bigint generated always as identity primary key,
    account text not null,
    address text not null,
    succeeded boolean not null default false,
    at timestamptz not null
  )`.execute(db)
  await sql`create index sign_in_attempts_by_account on sign_in_attempts (account, at)`.execute(db)
  await sql`create index sign_in_attempts_by_address on sign_in_attempts (address, at)`.execute(db)
  await sql`create index sign_in_attempts_by_time on sign_in_attempts (at)`.execute(db)

  // A person sees the memberships of the organisation in scope, and always their own, to choose among them.
  for (const table of ['organisations', 'memberships']) {
    await sql`alter table ${sql.table(table)} enable row level security`.execute(db)
    await sql`alter table ${sql.table(table)} force row level security`.execute(db)
  }
  await sql`create policy in_scope on memberships
    using (organisation_id = halfsplit_organisation())
    with check (organisation_id = halfsplit_organisation())`.execute(db)
  await sql`create policy own on memberships for select using (user_id = halfsplit_user())`.execute(db)
  await sql`create policy in_scope on organisations
    using (id = halfsplit_organisation()) with check (id = halfsplit_organisation())`.execute(db)
  await sql`create policy own on organisations for select using (exists (
    select from memberships m where m.organisation_id = organisations.id and m.user_id = halfsplit_user()
  ))`.execute(db)

  await sql`grant select, insert, update, delete on organisations, users, memberships, sign_in_attempts
    to halfsplit_app`.execute(db)
}
