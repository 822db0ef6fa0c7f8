import { type Kysely, sql } from 'kysely'

/**
 * Vehicles with their connectors, and circuits as rows. Keys start with the organisation, so that a reference
 * cannot cross from one to another. Search columns compare by bytes: row-level security lets only comparisons
 * that cannot leak use an index, which rules out LIKE, so a beginning is searched as a range.
 */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`create table vehicles (
    organisation_id uuid not null references organisations (id) on delete cascade,
    id uuid not null,
    title text not null,
    title_key text collate "C" not null,
    created_at timestamptz not null default now(),
    primary key (organisation_id, id)
  )`.execute(db)
  // A circuit without a vehicle has a nameless one of its own, whose connectors nobody else shares.
  await sql`create unique index vehicles_by_title on vehicles (organisation_id, title_key)
    where title_key <> ''`.execute(db)

  await sql`create table connectors (
    organisation_id uuid not null,
    vehicle_id uuid not null,
    id text not null,
    label text not null,
    label_key text collate "C" not null,
    cavities integer,
    rest jsonb not null,
    primary key (organisation_id, vehicle_id, id),
    foreign key (organisation_id, vehicle_id) references vehicles (organisation_id, id) on delete cascade
  )`.execute(db)

  await sql`create table circuits (
    organisation_id uuid not null,
    id uuid not null,
    vehicle_id uuid not null,
    title text not null,
    title_key text collate "C" not null,
    vehicle text not null,
    system text collate "C" not null,
    revision integer not null check (revision >= 1),
    rest jsonb not null,
    created_by uuid references users (id) on delete set null,
    saved_by uuid references users (id) on delete set null,
    created_at timestamptz not null,
    updated_at timestamptz not null,
    deleted_at timestamptz,
    primary key (organisation_id, id),
    unique (organisation_id, id, vehicle_id),
    foreign key (organisation_id, vehicle_id) references vehicles (organisation_id, id)
  )`.execute(db)
  await sql`create index circuits_by_title on circuits (organisation_id, title_key, id)
    where deleted_at is null`.execute(db)
  await sql`create index circuits_by_system on circuits (organisation_id, system, title_key, id)
    where deleted_at is null`.execute(db)
  await sql`create index circuits_by_vehicle on circuits (organisation_id, vehicle_id)`.execute(db)

  const ofCircuit = sql`foreign key (organisation_id, circuit_id) references circuits (organisation_id, id) on delete cascade`
  await sql`create table circuit_connectors (
    organisation_id uuid not null,
    circuit_id uuid not null,
    position integer not null,
    vehicle_id uuid not null,
    connector text not null,
    primary key (organisation_id, circuit_id, connector),
    foreign key (organisation_id, circuit_id, vehicle_id)
      references circuits (organisation_id, id, vehicle_id) on delete cascade,
    foreign key (organisation_id, vehicle_id, connector)
      references connectors (organisation_id, vehicle_id, id)
  )`.execute(db)
  await sql`create index circuit_connectors_by_connector
    on circuit_connectors (organisation_id, vehicle_id, connector)`.execute(db)

  await sql`create table circuit_nodes (
    organisation_id uuid not null,
    circuit_id uuid not null,
    id text not null,
    position integer not null,
    kind text not null,
    label text not null,
    connector text,
    rest jsonb not null,
    primary key (organisation_id, circuit_id, id),
    ${ofCircuit}
  )`.execute(db)

  await sql`create table circuit_wires (
    organisation_id uuid not null,
    circuit_id uuid not null,
    id text not null,
    position integer not null,
    from_node text not null,
    from_port text not null,
    to_node text not null,
    to_port text not null,
    colour text not null,
    signal text not null,
    mm2 double precision not null,
    rest jsonb not null,
    primary key (organisation_id, circuit_id, id),
    foreign key (organisation_id, circuit_id, from_node)
      references circuit_nodes (organisation_id, circuit_id, id) on delete cascade,
    foreign key (organisation_id, circuit_id, to_node)
      references circuit_nodes (organisation_id, circuit_id, id) on delete cascade
  )`.execute(db)
  await sql`create index circuit_wires_by_from on circuit_wires (organisation_id, circuit_id, from_node, from_port)`.execute(
    db,
  )
  await sql`create index circuit_wires_by_to on circuit_wires (organisation_id, circuit_id, to_node, to_port)`.execute(
    db,
  )

  // Which port of which part sits in which cavity: one row for each, whether a wire lands there or not.
  await sql`create table circuit_cavities (
    organisation_id uuid not null,
    circuit_id uuid not null,
    node text not null,
    port text not null,
    vehicle_id uuid not null,
    connector text not null,
    number integer not null,
    name text not null,
    primary key (organisation_id, circuit_id, node, port),
    foreign key (organisation_id, circuit_id, node)
      references circuit_nodes (organisation_id, circuit_id, id) on delete cascade
  )`.execute(db)
  await sql`create index circuit_cavities_by_number
    on circuit_cavities (organisation_id, vehicle_id, connector, number)`.execute(db)

  // The lines of the search by place: a wire where it meets a cavity, or as a whole where it meets none.
  await sql`create table circuit_places (
    organisation_id uuid not null,
    circuit_id uuid not null,
    wire text not null,
    side text not null check (side in ('from', 'to')),
    connector text,
    connector_key text collate "C" not null,
    number integer not null,
    colour_base text collate "C" not null,
    colour_stripe text collate "C" not null,
    carries text not null,
    primary key (organisation_id, circuit_id, wire, side),
    foreign key (organisation_id, circuit_id, wire)
      references circuit_wires (organisation_id, circuit_id, id) on delete cascade
  )`.execute(db)
  await sql`create index circuit_places_by_connector
    on circuit_places (organisation_id, connector_key, number, circuit_id, wire, side)`.execute(db)
  await sql`create index circuit_places_by_number
    on circuit_places (organisation_id, number, connector_key, circuit_id, wire, side)`.execute(db)
  await sql`create index circuit_places_by_colour
    on circuit_places (organisation_id, colour_base, colour_stripe, connector_key, number, circuit_id, wire, side)`.execute(
    db,
  )

  await sql`create table circuit_codes (
    organisation_id uuid not null,
    circuit_id uuid not null,
    position integer not null,
    code text not null,
    failure_type text,
    code_key text collate "C" not null,
    rest jsonb not null,
    primary key (organisation_id, circuit_id, position),
    ${ofCircuit}
  )`.execute(db)
  await sql`create index circuit_codes_by_code on circuit_codes (organisation_id, code_key, circuit_id)`.execute(
    db,
  )

  await sql`create table circuit_words (
    organisation_id uuid not null,
    circuit_id uuid not null,
    word text collate "C" not null,
    primary key (organisation_id, word, circuit_id),
    ${ofCircuit}
  )`.execute(db)
  await sql`create index circuit_words_by_circuit on circuit_words (organisation_id, circuit_id)`.execute(db)

  await sql`create table circuit_revisions (
    organisation_id uuid not null,
    circuit_id uuid not null,
    revision integer not null,
    document jsonb not null,
    saved_by uuid references users (id) on delete set null,
    saved_at timestamptz not null,
    primary key (organisation_id, circuit_id, revision),
    ${ofCircuit}
  )`.execute(db)

  const tables = [
    'vehicles',
    'connectors',
    'circuits',
    'circuit_connectors',
    'circuit_nodes',
    'circuit_wires',
    'circuit_cavities',
    'circuit_places',
    'circuit_codes',
    'circuit_words',
    'circuit_revisions',
  ]
  for (const name of tables) {
    const table = sql.table(name)
    await sql`alter table ${table} enable row level security`.execute(db)
    await sql`alter table ${table} force row level security`.execute(db)
    await sql`create policy in_scope on ${table} using (organisation_id = halfsplit_organisation())
      with check (organisation_id = halfsplit_organisation())`.execute(db)
    // An edition, once saved, is never changed.
    const rights = sql.raw(name === 'circuit_revisions' ? 'select, insert' : 'select, insert, update, delete')
    await sql`grant ${rights} on ${table} to halfsplit_app`.execute(db)
  }
}
