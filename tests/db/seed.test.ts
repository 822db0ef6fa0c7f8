import { execFile } from 'node:child_process'
import path from 'node:path'
import { promisify } from 'node:util'
import { beforeAll, describe, expect, it } from 'vitest'
import type { Tables } from '@/db/tables/database'
import { withOrganisation } from '@/db/with-organisation'
import { samples } from '@/diagrams/samples/all-samples'
import { evaluate } from '@/diagrams/evaluate'
import { getTrace } from '@/lib/server/use-cases/traces/get-trace'
import { listTraces } from '@/lib/server/use-cases/traces/list-traces'
import { roles } from '@/lib/shared/permissions'
import { school, shop } from '../../scripts/seed/people'
import { demoTraces } from '../../scripts/seed/traces'
import { signIn } from '@/lib/server/use-cases/account/sign-in'
import { withDatabase } from '../support/database'
import { type Person, personOf } from '../app/support/shop'

const root = path.join(import.meta.dirname, '../..')
const run = promisify(execFile)

describe('the demo scenario', () => {
  const database = withDatabase<Tables>()
  let technician: Person
  const lay = (password: string) =>
    run(process.execPath, ['--import', 'tsx', 'scripts/seed.ts'], {
      cwd: root,
      env: { ...process.env, DATABASE_URL: database.appUrl, DEMO_PASSWORD: password },
    })
  const counts = async () =>
    Promise.all(
      [shop, school].map((organisation) =>
        withOrganisation(database.app, organisation.id, async (trx) => ({
          circuits: (await trx.selectFrom('circuits').select('id').execute()).length,
          revisions: (await trx.selectFrom('circuit_revisions').select('revision').execute()).length,
          members: (await trx.selectFrom('memberships').select('user_id').execute()).length,
          traces: (await trx.selectFrom('traces').select('state').orderBy('state').execute()).map(
            (t) => t.state,
          ),
          readings: (await trx.selectFrom('trace_readings').select('id').execute()).length,
        })),
      ),
    )

  beforeAll(async () => {
    const { stdout } = await lay('first demo password')
    expect(stdout).toContain('Password of all of them: first demo password')
    for (const person of [...shop.people, ...school.people]) expect(stdout).toContain(person.email)
    process.env.NEXTAUTH_SECRET = 'a secret of the tests, long enough'
    process.env.DATABASE_URL = database.appUrl
    const noor = shop.people.find(({ role }) => role === 'technician')
    technician = await personOf(database.app, noor?.id ?? '', shop.id)
  }, 120_000)

  it('has a shop and a school, people for every role, all samples in both, two traces done and one open', async () => {
    const [inShop, inSchool] = await counts()
    expect(inShop).toMatchObject({ circuits: samples.length, traces: ['done', 'done', 'open'] })
    expect(inSchool).toMatchObject({ circuits: samples.length, traces: [] })
    expect(samples.length).toBeGreaterThanOrEqual(8)
    const there = new Set([...shop.people, ...school.people].map(({ role }) => role))
    expect([...there].sort()).toEqual([...roles].sort())
  })

  it('is laid again without a change, but for a password that the settings changed', async () => {
    const before = await counts()
    await lay('second demo password')
    expect(await counts()).toEqual(before)
    const enter = (password: string) =>
      signIn(
        { db: database.app, now: new Date() },
        { email: 'bo@marlstreet.example', password },
        { secret: 'any', address: '192.0.2.9' },
      )
    expect((await enter('first demo password')).ok).toBe(false)
    expect((await enter('second demo password')).ok).toBe(true)
  }, 60_000)

  it('holds readings that the evaluator agrees with: the true place is never proved good, and found where it ended', async () => {
    const listed = await listTraces(technician.context, {})
    if (!listed.ok) throw new Error(listed.failure.message)
    expect(listed.value.rows).toHaveLength(demoTraces.length)
    for (const row of listed.value.rows) {
      const trace = await getTrace(technician.context, { id: row.id })
      if (!trace.ok) throw new Error(trace.failure.message)
      const planted = demoTraces.find(({ complaint }) => complaint === row.complaint)
      const { circuit, readings, codes } = trace.value
      expect(readings).toHaveLength(planted?.probes.length ?? 0)
      const answer = evaluate({ circuit: circuit.document, readings, codes, priors: 'trade' })
      const place = answer.sites.find(({ site }) => site === planted?.fault.site)
      expect([row.title, place?.verdict]).not.toEqual([row.title, 'proved-good'])
      if (trace.value.state === 'done') expect([row.title, place?.verdict]).toEqual([row.title, 'faulty'])
    }
  }, 120_000)
})
