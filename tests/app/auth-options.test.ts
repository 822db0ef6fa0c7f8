import { beforeAll, describe, expect, it } from 'vitest'
import { updatePassword } from '@/db/queries/users'
import type { Tables } from '@/db/tables/database'
import { withOrganisation } from '@/db/with-organisation'
import { authOptions } from '@/lib/server/http/auth-options'
import { hashPassword } from '@/lib/server/use-cases/account/password'
import { withDatabase } from '../support/database'
import type { Loose } from './support/example'
import { makeShop, password, type Shop } from './support/shop'

describe('what next-auth is told', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
  })
  const options = (): Loose => authOptions()
  const authorize = (credentials: object) =>
    options().providers[0].options.authorize(credentials, {
      headers: { 'x-forwarded-for': '10.0.0.1, 192.0.2.4' },
    })

  it('answers a refused sign-in with a code of the table, whatever was sent', async () => {
    const { email } = shop.people.owner.actor
    for (const credentials of [
      { email, password: 'wrong' },
      { email: 'nobody@alderlane.example', password },
      { email: 'no address', password },
      { email: [email], password },
      { email, password: 'x'.repeat(500) },
      {},
    ])
      await expect(authorize(credentials)).rejects.toThrow(/^wrong-sign-in$/)
  })

  it('puts person, organisation and stamp into the cookie, and drops the session once the stamp is old', async () => {
    const { actor } = shop.people.technician
    const user = await authorize({ email: actor.email, password })
    const { callbacks } = options()
    const token = await callbacks.jwt({ token: {}, user })
    expect(token).toMatchObject({
      sub: actor.userId,
      organisationId: shop.organisationId,
      stamp: expect.any(String),
    })
    expect(JSON.stringify(token)).not.toContain('argon2')
    const session = { user: { name: actor.name }, expires: '2099-01-01' }
    expect(await callbacks.session({ session, token })).toEqual(session)
    await withOrganisation(database.app, shop.organisationId, async (trx) =>
      updatePassword(trx, actor.userId, await hashPassword('another long password')),
    )
    expect(await callbacks.session({ session, token })).toEqual({ expires: new Date(0).toISOString() })
  })

  it('counts attempts by the address that the last proxy saw', async () => {
    const rows = await database.app.selectFrom('sign_in_attempts').select('address').distinct().execute()
    expect(rows).toEqual([{ address: '192.0.2.4' }])
  })
})
