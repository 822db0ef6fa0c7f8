import { type Kysely, sql } from 'kysely'

/** What the driver tells, load by load or as a step of the sequence, beside the complaint in words. */
export async function up(db: Kysely<unknown>): Promise<void> {
  await sql`alter table traces add column symptoms jsonb not null default '[]'`.execute(db)
}
