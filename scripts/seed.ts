// Lays the demo scenario: a shop and a school with their people, the sample circuits in both, traces in the shop.
// Harmless to repeat: what is there stays. Prints who may sign in.
import { randomUUID } from 'node:crypto'
import { connect } from '@/db/connect'
import type { Database } from '@/db/tables/database'
import type { Context } from '@/lib/server/context'
import { layCircuits } from './seed/lay-circuits'
import { layTraces } from './seed/lay-traces'
import { type DemoOrganisation, type DemoPerson, layPeople, school, shop } from './seed/people'

const { DATABASE_URL: url, DEMO_PASSWORD: password } = process.env
if (!url || !password) {
  console.error(
    'DATABASE_URL and DEMO_PASSWORD must be set; expected the address under the application role.',
  )
  process.exit(1)
}

const db = connect(url, { most: 2 })
try {
  await layPeople(db, shop, password)
  await layPeople(db, school, password)
  const circuits = await layCircuits(contextOf(db, shop, 'technician'), shop)
  await layCircuits(contextOf(db, school, 'instructor'), school)
  await layTraces(contextOf(db, shop, 'technician'), shop, circuits)
  console.log([...describe(shop), ...describe(school), `Password of all of them: ${password}`].join('\n'))
} finally {
  await db.destroy()
}

function contextOf(pool: Database, organisation: DemoOrganisation, role: DemoPerson['role']): Context {
  const person = organisation.people.find((candidate) => candidate.role === role)
  if (!person) throw new Error(`${organisation.name} has no ${role}`)
  return {
    db: pool,
    now: new Date(),
    newId: randomUUID,
    actor: {
      userId: person.id,
      name: person.name,
      email: person.email,
      organisationId: organisation.id,
      organisation: organisation.name,
      role,
    },
  }
}

function describe({ name, kind, people }: DemoOrganisation): string[] {
  return [`${name}, a ${kind}`, ...people.map(({ role, email }) => `  ${role.padEnd(11)} ${email}`)]
}
