import type { Database } from '@/db/tables/database'
import type { Role } from '@/lib/shared/permissions'

/** Who asks, in which organisation, in which role. */
export interface Actor {
  userId: string
  name: string
  email: string
  organisationId: string
  organisation: string
  role: Role
}

/** What a use case works with. `now` is a moment, so that a write carries one time throughout. */
export interface Context {
  db: Database
  actor: Actor
  now: Date
  newId: () => string
}

/** The same for what needs nobody signed in. */
export type OpenContext = Omit<Context, 'actor'>
