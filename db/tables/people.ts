import type { ColumnType, Generated } from 'kysely'

/** A moment: read as Date, written as Date. */
export type Moment = ColumnType<Date, Date, Date>
export type MadeMoment = ColumnType<Date, Date | undefined, never>

export interface OrganisationsTable {
  id: string
  name: string
  kind: 'shop' | 'school' | 'both'
  created_at: MadeMoment
}

export interface UsersTable {
  id: string
  email: string
  name: string
  password_hash: string
  created_at: MadeMoment
}

export interface MembershipsTable {
  organisation_id: string
  user_id: string
  role: 'owner' | 'instructor' | 'technician' | 'student'
  created_at: MadeMoment
}

export interface SignInAttemptsTable {
  id: Generated<string>
  account: string
  address: string
  succeeded: Generated<boolean>
  at: Moment
}
