import { randomUUID } from 'node:crypto'
import { sql } from 'kysely'
import { beforeAll, describe, expect, it } from 'vitest'
import { connect } from '@/db/connect'
import { insertMembership, updatePassword } from '@/db/queries/users'
import type { Tables } from '@/db/tables/database'
import { withOrganisation } from '@/db/with-organisation'
import { chooseMembership } from '@/lib/server/use-cases/account/choose-membership'
import { openSession } from '@/lib/server/use-cases/account/open-session'
import { hashPassword } from '@/lib/server/use-cases/account/password'
import { signIn, signInLimits } from '@/lib/server/use-cases/account/sign-in'
import { signUp } from '@/lib/server/use-cases/account/sign-up'
import { withDatabase } from '../support/database'
import { call } from './support/call'
import { makeShop, password, personOf, secret, type Shop } from './support/shop'

describe('signing up, in and out of reach', () => {
  const database = withDatabase<Tables>()
  let shop: Shop
  beforeAll(async () => {
    shop = await makeShop(database, 'Alder Lane')
  })

  let clock = Date.UTC(2026, 11, 1, 8)
  const later = (minutes: number) => {
    clock += minutes * 60_000
  }
  const enter = (email: string, typed: string, address = '192.0.2.1', db = database.app) =>
    signIn({ db, now: new Date(clock) }, { email, password: typed }, { secret, address })
  const codeOf = (result: Awaited<ReturnType<typeof enter>>) => (result.ok ? 'ok' : result.failure.code)

  it('makes an organisation with its first owner, whose password is kept as argon2id', async () => {
    const email = `Noor-${randomUUID()}@Alderlane.Example`
    const made = await signUp(
      { db: database.app, now: new Date(), newId: randomUUID },
      { organisation: ' Marl Street School ', kind: 'school', name: 'Noor', email, password },
    )
    if (!made.ok) throw new Error(made.failure.message)
    const entered = await enter(email.toUpperCase(), password)
    if (!entered.ok) throw new Error(entered.failure.message)
    const session = await openSession(database.app, secret, entered.value)
    expect(session?.actor).toMatchObject({ organisation: 'Marl Street School', role: 'owner', name: 'Noor' })
    const user = await database.app
      .selectFrom('users')
      .select('password_hash')
      .where('email', '=', email.toLowerCase())
      .executeTakeFirstOrThrow()
    expect(user.password_hash).toMatch(/^\$argon2id\$v=19\$m=19456,t=2,p=1\$/)
  })

  it('refuses a taken address and leaves no organisation behind', async () => {
    const count = () =>
      sql<{ n: number }>`select count(*)::int as n from organisations`.execute(database.owner)
    // Row-level security hides them from the owner too, so the count is taken without it.
    await sql`alter table organisations no force row level security`.execute(database.owner)
    const before = (await count()).rows[0]?.n
    expect(before).toBeGreaterThan(0)
    const taken = await signUp(
      { db: database.app, now: new Date(), newId: randomUUID },
      { organisation: 'Second', name: 'Kim', email: shop.people.owner.actor.email, password },
    )
    expect(taken).toMatchObject({ ok: false, failure: { code: 'address-taken', path: 'email' } })
    expect((await count()).rows[0]?.n).toBe(before)
    await sql`alter table organisations force row level security`.execute(database.owner)
  })

  it('names the field of a form that is not filled in well', async () => {
    const form = { organisation: 'Shop', name: 'Kim', email: 'kim@alderlane.example', password }
    for (const [field, value] of Object.entries({
      organisation: '  ',
      name: '',
      email: 'kim',
      password: 'short',
    })) {
      const result = await signUp(
        { db: database.app, now: new Date(), newId: randomUUID },
        { ...form, [field]: value },
      )
      expect(result).toMatchObject({ ok: false, failure: { code: 'invalid', path: field } })
      if (!result.ok) expect(result.failure.message).toMatch(new RegExp(`^${field}: `))
    }
  })

  it('answers an unknown address and a wrong password alike, after the same work', async () => {
    const { email } = shop.people.technician.actor
    const wrong = await enter(email, 'not the password')
    const unknown = await enter('nobody@alderlane.example', 'not the password')
    expect(unknown).toEqual(wrong)
    expect(codeOf(wrong)).toBe('wrong-sign-in')
    const times: Record<string, number[]> = { [email]: [], 'nobody@alderlane.example': [] }
    // By turns, so that a busy machine slows both alike.
    for (let i = 0; i < 9; i++)
      for (const [address, taken] of Object.entries(times)) {
        later(60)
        const start = performance.now()
        await enter(address, 'not the password')
        taken.push(performance.now() - start)
      }
    const [known = 0, nobody = 0] = Object.values(times).map((taken) => taken.sort((a, b) => a - b)[4] ?? 0)
    // One password check is most of the time; without it the unknown address would answer in a tenth.
    expect(nobody / known).toBeGreaterThan(0.35)
    expect(nobody / known).toBeLessThan(3)
  })

  it('stops guessing at one account after ten failures from anywhere, known or not, for a quarter of an hour', async () => {
    for (const email of [shop.people.student.actor.email, 'guessed@alderlane.example']) {
      later(60)
      for (let i = 0; i < signInLimits.account; i++)
        expect(codeOf(await enter(email, 'guess', `198.51.100.${i}`))).toBe('wrong-sign-in')
      expect(codeOf(await enter(email, password, '198.51.100.99'))).toBe('too-many-attempts')
    }
    later(16)
    expect(codeOf(await enter(shop.people.student.actor.email, password))).toBe('ok')
  })

  it('stops one address that tries many accounts', async () => {
    later(60)
    const results: string[] = []
    for (let i = 0; i < signInLimits.address + 1; i++)
      results.push(codeOf(await enter(`someone${i}@alderlane.example`, 'guess', '203.0.113.7')))
    expect(results.filter((code) => code === 'wrong-sign-in')).toHaveLength(signInLimits.address)
    expect(results.at(-1)).toBe('too-many-attempts')
    expect(codeOf(await enter(shop.people.owner.actor.email, password, '203.0.113.8'))).toBe('ok')
  })

  it('counts attempts of several processes at once together', async () => {
    later(60)
    const others = [connect(database.appUrl, { most: 3 }), connect(database.appUrl, { most: 3 })]
    const results = await Promise.all(
      Array.from({ length: 24 }, (_, i) =>
        enter(shop.people.instructor.actor.email, 'guess', `198.51.100.${i}`, others[i % 2]),
      ),
    )
    expect(results.filter((result) => codeOf(result) === 'wrong-sign-in').length).toBeLessThanOrEqual(
      signInLimits.account,
    )
    await Promise.all(others.map((db) => db.destroy()))
  })

  it('keeps no address that was typed', async () => {
    const rows = await database.app.selectFrom('sign_in_attempts').selectAll().execute()
    expect(rows.length).toBeGreaterThan(10)
    expect(JSON.stringify(rows)).not.toContain('alderlane')
  })

  describe('a session', () => {
    const works = async (cookie: string) => (await call({ cookie }, 'GET', 'circuits')).status === 200

    it('is worth nothing once the password changed', async () => {
      const lane = await makeShop(database, 'Lane')
      const { actor, cookie } = lane.people.technician
      expect(await works(cookie)).toBe(true)
      await withOrganisation(database.app, lane.organisationId, async (trx) =>
        updatePassword(trx, actor.userId, await hashPassword('another long password')),
      )
      expect(await works(cookie)).toBe(false)
      expect(await works((await personOf(database.app, actor.userId, lane.organisationId)).cookie)).toBe(true)
    })

    it('is worth nothing once the role changed, or the membership ended, even if it begins again', async () => {
      const lane = await makeShop(database, 'Lane')
      const scoped = (work: Parameters<typeof withOrganisation<unknown>>[2]) =>
        withOrganisation(database.app, lane.organisationId, work)
      const { technician, student } = lane.people
      await scoped((trx) =>
        trx
          .updateTable('memberships')
          .set({ role: 'student' })
          .where('user_id', '=', technician.actor.userId)
          .execute(),
      )
      expect(await works(technician.cookie)).toBe(false)
      const member = { organisation_id: lane.organisationId, user_id: student.actor.userId }
      await scoped((trx) => trx.deleteFrom('memberships').where('user_id', '=', member.user_id).execute())
      expect(await works(student.cookie)).toBe(false)
      await scoped((trx) => insertMembership(trx, { ...member, role: 'student' }))
      expect(await works(student.cookie)).toBe(false)
      expect(await works(lane.people.owner.cookie)).toBe(true)
    })

    it('cannot be made up, altered or taken from an older secret', async () => {
      const { cookie } = shop.people.owner
      expect(await works(`${cookie}x`)).toBe(false)
      expect(await works('next-auth.session-token=abc.def.ghi.jkl.mno')).toBe(false)
      expect(await works('next-auth.session-token=')).toBe(false)
      const claim = { ...shop.people.owner.actor, stamp: 'made up' }
      expect(await openSession(database.app, secret, claim)).toBeNull()
      expect(await openSession(database.app, secret, { ...claim, organisationId: 'x' })).toBeNull()
    })

    it('moves between the organisations a person belongs to, and into no other', async () => {
      const [one, two, three] = [
        await makeShop(database, 'One'),
        await makeShop(database, 'Two'),
        await makeShop(database, 'Three'),
      ]
      const { actor, context } = one.people.instructor
      await withOrganisation(database.app, two.organisationId, (trx) =>
        insertMembership(trx, {
          organisation_id: two.organisationId,
          user_id: actor.userId,
          role: 'student',
        }),
      )
      const chosen = await chooseMembership(context, { organisationId: two.organisationId }, { secret })
      if (!chosen.ok) throw new Error(chosen.failure.message)
      const session = await openSession(database.app, secret, chosen.value)
      expect(session?.actor).toMatchObject({ organisation: 'Two', role: 'student' })
      expect(session?.memberships.map(({ organisation, role }) => [organisation, role])).toEqual([
        ['One', 'instructor'],
        ['Two', 'student'],
      ])
      const foreign = await chooseMembership(context, { organisationId: three.organisationId }, { secret })
      expect(foreign.ok || foreign.failure.code).toBe('not-found')
    })
  })
})
