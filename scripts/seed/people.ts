import {
  findUserByEmail,
  insertMembership,
  insertOrganisation,
  insertUser,
  updatePassword,
} from '@/db/queries/users'
import type { Database } from '@/db/tables/database'
import { withOrganisation } from '@/db/with-organisation'
import { checkPassword, hashPassword } from '@/lib/server/use-cases/account/password'
import type { Role } from '@/lib/shared/permissions'

// All invented. Ids are fixed, so that laying the scenario again finds what it laid before.
const id = (n: number) => `0d0e0000-0000-4000-8000-${String(n).padStart(12, '0')}`

export interface DemoPerson {
  id: string
  name: string
  email: string
  role: Role
}
export interface DemoOrganisation {
  id: string
  name: string
  kind: 'shop' | 'school'
  /** Sets its fixed ids apart from the other's. */
  base: number
  people: DemoPerson[]
}

const kim = { id: id(11), name: 'Kim Alder', email: 'kim@alderlane.example' }

export const shop: DemoOrganisation = {
  id: id(1),
  name: 'Alder Lane Garage',
  kind: 'shop',
  base: 1000,
  people: [
    { ...kim, role: 'owner' },
    { id: id(12), name: 'Noor Pell', email: 'noor@alderlane.example', role: 'technician' },
    { id: id(13), name: 'Piet Varn', email: 'piet@alderlane.example', role: 'student' },
  ],
}

export const school: DemoOrganisation = {
  id: id(2),
  name: 'Marl Street College',
  kind: 'school',
  base: 2000,
  people: [
    { id: id(21), name: 'Ines Corrow', email: 'ines@marlstreet.example', role: 'owner' },
    { id: id(22), name: 'Bo Tamsin', email: 'bo@marlstreet.example', role: 'instructor' },
    { id: id(23), name: 'Sami Rell', email: 'sami@marlstreet.example', role: 'student' },
    // Belongs to both, to show choosing between organisations.
    { ...kim, role: 'instructor' },
  ],
}

export function demoId({ base }: DemoOrganisation, n: number): string {
  return id(base + n)
}

/** Makes an organisation and its people where they are missing; their password is the one of the settings. */
export async function layPeople(
  db: Database,
  organisation: DemoOrganisation,
  password: string,
): Promise<void> {
  await withOrganisation(db, organisation.id, async (trx) => {
    const there = await trx.selectFrom('organisations').select('id').executeTakeFirst()
    if (!there)
      await insertOrganisation(trx, { id: organisation.id, name: organisation.name, kind: organisation.kind })
    for (const { id: userId, name, email, role } of organisation.people) {
      const known = await findUserByEmail(trx, email)
      if (known && !(await checkPassword(known.password_hash, password)))
        await updatePassword(trx, known.id, await hashPassword(password))
      if (!known)
        await insertUser(trx, { id: userId, name, email, password_hash: await hashPassword(password) })
      await insertMembership(trx, {
        organisation_id: organisation.id,
        user_id: known?.id ?? userId,
        role,
      })
    }
  })
}
