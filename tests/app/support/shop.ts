import { randomUUID } from 'node:crypto'
import { insertMembership, insertUser, loadPerson } from '@/db/queries/users'
import type { Database, Tables } from '@/db/tables/database'
import { withOrganisation, withUser } from '@/db/with-organisation'
import { sealSession, sessionCookieName } from '@/lib/server/http/session-cookie'
import { type Session, stampOf } from '@/lib/server/use-cases/account/open-session'
import { hashPassword } from '@/lib/server/use-cases/account/password'
import { signUp } from '@/lib/server/use-cases/account/sign-up'
import type { Context } from '@/lib/server/context'
import { type Role, roles } from '@/lib/shared/permissions'
import type { TestDatabase } from '../../support/database'

export const secret = 'a secret of the tests, long enough'
export const password = 'correct horse battery'

export interface Person {
  actor: Session['actor']
  context: Context
  /** As the browser sends it. */
  cookie: string
}

/** An organisation with one person for each role. */
export interface Shop {
  organisationId: string
  people: Record<Role, Person>
}

/** Settings as the server reads them, pointing at the database of this test file. */
function pointSettingsAt(appUrl: string): void {
  process.env.DATABASE_URL = appUrl
  process.env.NEXTAUTH_SECRET = secret
  process.env.NEXTAUTH_URL = 'http://127.0.0.1:3210'
}

export async function makeShop(
  database: TestDatabase<Tables>,
  name: string,
  { appUrl = database.appUrl }: { appUrl?: string } = {},
): Promise<Shop> {
  pointSettingsAt(appUrl)
  const db = database.app
  const mark = randomUUID().slice(0, 8)
  const email = (role: Role) => `${role}-${mark}@alderlane.example`
  const made = await signUp(
    { db, now: new Date(), newId: randomUUID },
    { organisation: name, name: 'owner', email: email('owner'), password },
  )
  if (!made.ok) throw new Error(made.failure.message)
  const { organisationId } = made.value
  const people = {} as Record<Role, Person>
  for (const role of roles) {
    const userId = role === 'owner' ? made.value.userId : randomUUID()
    if (role !== 'owner')
      await withOrganisation(db, organisationId, async (trx) => {
        await insertUser(trx, {
          id: userId,
          email: email(role),
          name: role,
          password_hash: await hashPassword(password),
        })
        await insertMembership(trx, { organisation_id: organisationId, user_id: userId, role })
      })
    people[role] = await personOf(db, userId, organisationId)
  }
  return { organisationId, people }
}

export async function personOf(db: Database, userId: string, organisationId: string): Promise<Person> {
  const found = await withUser(db, userId, (trx) => loadPerson(trx, userId))
  const membership = found?.memberships.find(({ id }) => id === organisationId)
  if (!found || !membership) throw new Error(`no member ${userId} of ${organisationId}`)
  const { user } = found
  const claim = { userId, organisationId, stamp: stampOf(secret, user, membership) }
  const actor = {
    userId,
    name: user.name,
    email: user.email,
    organisationId,
    organisation: membership.name,
    role: membership.role,
  }
  return {
    actor,
    context: { db, actor, now: new Date(), newId: randomUUID },
    cookie: `${sessionCookieName()}=${await sealSession(claim, user)}`,
  }
}
