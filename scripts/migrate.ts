// Brings the database to the newest migration under the role that owns the tables.
import { promises as fs } from 'node:fs'
import path from 'node:path'
import { FileMigrationProvider, Kysely, Migrator, PostgresDialect } from 'kysely'
import pg from 'pg'

const connectionString = process.env.DATABASE_OWNER_URL
if (!connectionString) {
  console.error('DATABASE_OWNER_URL is not set; expected the address of the database under its owner role.')
  process.exit(1)
}

const db = new Kysely<unknown>({
  dialect: new PostgresDialect({ pool: new pg.Pool({ connectionString, max: 1 }) }),
})
const migrationFolder = path.join(import.meta.dirname, '..', 'migrations')
const migrator = new Migrator({ db, provider: new FileMigrationProvider({ fs, path, migrationFolder }) })

const { error, results } = await migrator.migrateToLatest()
for (const result of results ?? []) {
  if (result.status === 'Success') console.error(`  migrated ${result.migrationName}`)
  if (result.status === 'Error')
    console.error(`  migration ${result.migrationName} failed; nothing of it was kept`)
}
await db.destroy()
// Kysely answers a failure instead of throwing it.
if (error) {
  console.error(error)
  process.exit(1)
}
