import { Kysely, PostgresDialect } from 'kysely'
import pg from 'pg'
import type { Database, Tables } from './tables/database'

/** Opens a pool; nothing is sent before the first query. A server that goes away is noticed within seconds. */
export function connect(url: string, { most = 10 }: { most?: number } = {}): Database {
  const pool = new pg.Pool({
    connectionString: url,
    max: most,
    connectionTimeoutMillis: 4_000,
    query_timeout: 20_000,
    statement_timeout: 15_000,
    idleTimeoutMillis: 30_000,
  })
  // A connection that breaks while idle is simply dropped; the next query reports what is wrong.
  pool.on('error', () => {})
  // One that breaks while a transaction holds it between two queries would otherwise end the process.
  pool.on('connect', (client) => client.on('error', () => {}))
  return new Kysely<Tables>({ dialect: new PostgresDialect({ pool }) })
}
