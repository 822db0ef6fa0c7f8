import { sql } from 'kysely'
import { describe, expect, it } from 'vitest'
import { withDatabase } from './database'

type Row<T> = { rows: T[] }

describe('the tests’ database', () => {
  const database = withDatabase<Record<string, never>>()

  it('gives the application a role that owns nothing and cannot bypass row-level security', async () => {
    const role: Row<Record<string, unknown>> = await sql<Record<string, unknown>>`
      SELECT current_user AS name, rolsuper, rolbypassrls, rolcreatedb, rolcreaterole,
        (SELECT count(*)::int FROM pg_class WHERE relowner = pg_roles.oid) AS owned
      FROM pg_roles WHERE rolname = current_user`.execute(database.app)
    expect(role.rows[0]).toEqual({
      name: 'halfsplit_app',
      rolsuper: false,
      rolbypassrls: false,
      rolcreatedb: false,
      rolcreaterole: false,
      owned: 0,
    })
  })

  it('lets the owner make tables and keeps the application from making any', async () => {
    await sql`CREATE TABLE scratch (id int)`.execute(database.owner)
    await expect(sql`CREATE TABLE mine (id int)`.execute(database.app)).rejects.toThrow(/permission denied/)
    await expect(sql`SELECT * FROM scratch`.execute(database.app)).rejects.toThrow(/permission denied/)
  })

  it('listens on this machine alone and asks every connection for a password', async () => {
    const settings = await sql<{ listen: string; port: string }>`
      SELECT current_setting('listen_addresses') AS listen, current_setting('port') AS port`.execute(
      database.owner,
    )
    expect(settings.rows[0]?.listen).toBe('127.0.0.1')
    expect(Number(settings.rows[0]?.port)).toBeLessThan(32768)
    const { default: pg } = await import('pg')
    const wrong = new pg.Client({ connectionString: database.appUrl.replace(/:[^:@]+@/, ':wrong@') })
    await expect(wrong.connect()).rejects.toThrow(/password authentication failed/)
  })
})
