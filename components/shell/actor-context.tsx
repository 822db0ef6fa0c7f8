'use client'

import { createContext, type ReactNode, useContext } from 'react'
import type { ChooseMembership } from '@/lib/shared/api/account'
import type { Role } from '@/lib/shared/permissions'
import type { Result } from '@/lib/shared/result'

/** Who is signed in, as the screens show it. What may be done is decided by the use cases. */
export interface ActorView {
  name: string
  email: string
  role: Role
  organisation: { id: string; name: string }
  memberships: { organisationId: string; organisation: string; role: Role }[]
}

/** Changes the organisation one works in. */
export type ChooseOrganisation = (input: ChooseMembership) => Promise<Result<null>>

const ActorContext = createContext<{ actor: ActorView; choose?: ChooseOrganisation } | null>(null)

export function ActorProvider({
  actor,
  choose,
  children,
}: {
  actor: ActorView
  choose?: ChooseOrganisation
  children: ReactNode
}) {
  return <ActorContext.Provider value={{ actor, choose }}>{children}</ActorContext.Provider>
}

/** Null outside the workspace. */
export function useActor(): ActorView | null {
  return useContext(ActorContext)?.actor ?? null
}

export function useChooseOrganisation(): ChooseOrganisation | undefined {
  return useContext(ActorContext)?.choose
}
