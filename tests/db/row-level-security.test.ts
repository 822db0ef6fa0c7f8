import { randomUUID } from 'node:crypto'
import { sql } from 'kysely'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { withOrganisation, withUser } from '@/db/with-organisation'
import { withDatabase } from '../support/database'

/** Tables that belong to the installation and not to one organisation. */
const common = ['users', 'sign_in_attempts', 'kysely_migration', 'kysely_migration_lock']

describe('row-level security', () => {
  const database = withDatabase<Tables>()
  const [shop, school] = [randomUUID(), randomUUID()]
  const member = randomUUID()

  beforeAll(async () => {
    await database.app
      .insertInto('users')
      .values({ id: member, email: 'kim@alderlane.example', name: 'Kim', password_hash: 'x' })
      .execute()
    for (const id of [shop, school])
      await withOrganisation(database.app, id, async (trx) => {
        await trx.insertInto('organisations').values({ id, name: id, kind: 'shop' }).execute()
        await trx
          .insertInto('vehicles')
          .values({ organisation_id: id, id: randomUUID(), title: 'Van', title_key: 'van' })
          .execute()
      })
    await withOrganisation(database.app, school, (trx) =>
      trx
        .insertInto('memberships')
        .values({ organisation_id: school, user_id: member, role: 'student' })
        .execute(),
    )
  })

  it('is on and forced on every table of an organisation, with a policy', async () => {
    const { rows } = await sql<{ name: string; on: boolean; forced: boolean; policies: number }>`
      select c.relname as name, c.relrowsecurity as on, c.relforcerowsecurity as forced,
        (select count(*)::int from pg_policy p where p.polrelid = c.oid) as policies
      from pg_class c where c.relkind in ('r', 'p') and c.relnamespace = 'public'::regnamespace`.execute(
      database.owner,
    )
    const owned = rows.filter((row) => !common.includes(row.name))
    expect(owned.length).toBeGreaterThanOrEqual(17)
    expect(owned.filter((row) => !row.on || !row.forced || row.policies === 0)).toEqual([])
  })

  it('shows one organisation to a query that forgot its where', async () => {
    const seen = await withOrganisation(database.app, shop, (trx) =>
      trx.selectFrom('vehicles').select('organisation_id').execute(),
    )
    expect(seen).toEqual([{ organisation_id: shop }])
    const changed = await withOrganisation(database.app, shop, (trx) =>
      trx.updateTable('vehicles').set({ title: 'Bus' }).returning('organisation_id').execute(),
    )
    expect(changed).toEqual([{ organisation_id: shop }])
    await withOrganisation(database.app, shop, (trx) => trx.deleteFrom('vehicles').execute())
    const left = await withOrganisation(database.app, school, (trx) =>
      trx.selectFrom('vehicles').select('title').execute(),
    )
    expect(left).toEqual([{ title: 'Van' }])
  })

  it('shows nothing outside of a scope, to the owner of the tables neither', async () => {
    for (const db of [database.app, database.owner]) {
      expect(await db.selectFrom('vehicles').selectAll().execute()).toEqual([])
      expect(await db.selectFrom('organisations').selectAll().execute()).toEqual([])
      expect(await db.selectFrom('memberships').selectAll().execute()).toEqual([])
    }
  })

  it('refuses a row for another organisation', async () => {
    const stray = withOrganisation(database.app, shop, (trx) =>
      trx
        .insertInto('vehicles')
        .values({ organisation_id: school, id: randomUUID(), title: 'Stray', title_key: 'stray' })
        .execute(),
    )
    await expect(stray).rejects.toThrow(/row-level security/)
  })

  it('refuses a reference from one organisation into another', async () => {
    const theirs = randomUUID()
    await withOrganisation(database.app, school, (trx) =>
      trx
        .insertInto('vehicles')
        .values({ organisation_id: school, id: theirs, title: 'Theirs', title_key: 'theirs' })
        .execute(),
    )
    const crossing = withOrganisation(database.app, shop, (trx) =>
      trx
        .insertInto('connectors')
        .values({
          organisation_id: shop,
          vehicle_id: theirs,
          id: 'c1',
          label: '',
          label_key: 'c1',
          cavities: null,
          rest: '{}',
        })
        .execute(),
    )
    await expect(crossing).rejects.toThrow(/foreign key/)
  })

  it('shows a person their own memberships and those organisations only', async () => {
    const seen = await withUser(database.app, member, (trx) =>
      trx.selectFrom('organisations').select('id').execute(),
    )
    expect(seen).toEqual([{ id: school }])
    const nobody = await withUser(database.app, randomUUID(), (trx) =>
      trx.selectFrom('memberships').selectAll().execute(),
    )
    expect(nobody).toEqual([])
  })

  it('ends with its transaction, so that a pooled connection carries no scope on', async () => {
    await withOrganisation(database.app, school, (trx) => trx.selectFrom('vehicles').selectAll().execute())
    for (let i = 0; i < 8; i++)
      expect(await database.app.selectFrom('vehicles').selectAll().execute()).toEqual([])
  })

  it('keeps the application from switching it off, and from changing an edition', async () => {
    await expect(sql`alter table vehicles disable row level security`.execute(database.app)).rejects.toThrow(
      /must be owner/,
    )
    await expect(
      withOrganisation(database.app, shop, (trx) =>
        trx.updateTable('circuit_revisions').set({ document: '{}' }).execute(),
      ),
    ).rejects.toThrow(/permission denied/)
  })
})
