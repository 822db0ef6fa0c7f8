import { type Kysely, sql } from 'kysely'

/** Traces, their readings in order, what was found, and the proof of the repair. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table traces (
    organisation_id uuid not null,
    id uuid not null,
    circuit_id uuid not null,
    revision integer not null,
    started_by uuid references users (id) on delete set null,
    vehicle text not null,
    complaint text not null,
    codes jsonb not null,
    cautions_answered_at timestamptz,
    state text not null check (state in ('open', 'done')),
    started_at timestamptz not null,
    updated_at timestamptz not null,
    primary key (organisation_id, id),
    foreign key (organisation_id, circuit_id, revision)
      references circuit_revisions (organisation_id, circuit_id, revision)
  )`.execute(db)
  await sql`create index traces_by_state on traces (organisation_id, state, updated_at desc, id)`.execute(db)
  await sql`create index traces_by_person on traces (organisation_id, started_by, state, updated_at desc, id)`.execute(
    db,
  )
  await sql`create index traces_by_circuit on traces (organisation_id, circuit_id, updated_at desc)`.execute(
    db,
  )

  const ofTrace = sql`foreign key (organisation_id, trace_id) references traces (organisation_id, id) on delete cascade`
  await sql`create table trace_readings (
    organisation_id uuid not null,
    trace_id uuid not null,
    id text not null,
    position bigint generated always as identity,
    kind text not null,
    reading jsonb not null,
    taken_by uuid references users (id) on delete set null,
    taken_at timestamptz not null,
    primary key (organisation_id, trace_id, id),
    ${ofTrace}
  )`.execute(db)
  await sql`create index trace_readings_in_order on trace_readings (organisation_id, trace_id, position)`.execute(
    db,
  )

  await sql`create table trace_findings (
    organisation_id uuid not null,
    trace_id uuid not null,
    site text,
    mode text,
    note text not null,
    repaired boolean not null,
    found_by uuid references users (id) on delete set null,
    found_at timestamptz not null,
    primary key (organisation_id, trace_id),
    check ((site is null) = (mode is null)),
    ${ofTrace}
  )`.execute(db)

  await sql`create table trace_proofs (
    organisation_id uuid not null,
    trace_id uuid not null,
    reading jsonb not null,
    works boolean not null,
    proved_by uuid references users (id) on delete set null,
    proved_at timestamptz not null,
    primary key (organisation_id, trace_id),
    ${ofTrace}
  )`.execute(db)

  for (const name of ['traces', 'trace_readings', 'trace_findings', 'trace_proofs']) {
    const table = sql.table(name)
    await sql`alter table ${table} enable row level security`.execute(db)
    await sql`alter table ${table} force row level security`.execute(db)
    await sql`create policy in_scope on ${table} using (organisation_id = halfsplit_organisation())
      with check (organisation_id = halfsplit_organisation())`.execute(db)
    await sql`grant select, insert, update, delete on ${table} to halfsplit_app`.execute(db)
  }
}
