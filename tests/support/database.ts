import { Kysely, PostgresDialect } from 'kysely'
import pg from 'pg'
import { afterAll, beforeAll } from 'vitest'
import { createTestDatabase, type TestDatabaseAddress } from './test-cluster'

/** A test file's own database, seen as its owner and as the application sees it. */
export type TestDatabase<Tables> = {
  readonly owner: Kysely<Tables>
  readonly app: Kysely<Tables>
  readonly ownerUrl: string
  readonly appUrl: string
}

/**
 * Gives this test file a migrated, empty PostgreSQL database for as long as it runs:
 * `const database = withDatabase<Database>()` at the top, `database.app` inside the tests.
 */
export function withDatabase<Tables>(): TestDatabase<Tables> {
  let address: TestDatabaseAddress | undefined
  let owner: Kysely<Tables> | undefined
  let app: Kysely<Tables> | undefined

  beforeAll(async () => {
    address = await createTestDatabase()
    owner = connect<Tables>(address.ownerUrl)
    app = connect<Tables>(address.appUrl)
  }, 120_000)

  afterAll(async () => {
    await Promise.all([owner?.destroy(), app?.destroy()])
    await address?.drop()
  })

  return {
    get owner() {
      return made(owner)
    },
    get app() {
      return made(app)
    },
    get ownerUrl() {
      return made(address).ownerUrl
    },
    get appUrl() {
      return made(address).appUrl
    },
  }
}

function connect<Tables>(connectionString: string): Kysely<Tables> {
  return new Kysely<Tables>({
    dialect: new PostgresDialect({ pool: new pg.Pool({ connectionString, max: 4 }) }),
  })
}

function made<T>(value: T | undefined): T {
  if (value === undefined)
    throw new Error('The database exists inside tests and hooks only, not while the file is read.')
  return value
}
