import { headers } from 'next/headers'
import { redirect } from 'next/navigation'
import type { ReactNode } from 'react'
import { ActorProvider } from '@/components/shell/actor-context'
import { SessionEnded } from '@/components/shell/session-ended'
import { chooseMembershipAction } from '@/lib/server/http/form-actions'
import { currentSession } from '@/lib/server/http/session'
import { askedPathHeader, wayBack } from '@/lib/shared/way-back'

/** Everything behind the sign-in. Each page draws its own running head, since each has something else to put there. */
export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const session = await currentSession()
  if (!session) {
    const asked = (await headers()).get(askedPathHeader)
    redirect(`/sign-in?ended=1&to=${encodeURIComponent(wayBack(asked))}`)
  }
  const { actor, memberships } = session
  return (
    <ActorProvider
      actor={{
        name: actor.name,
        email: actor.email,
        role: actor.role,
        organisation: { id: actor.organisationId, name: actor.organisation },
        memberships,
      }}
      choose={chooseMembershipAction}
    >
      <div className="flex min-h-dvh flex-col">{children}</div>
      <SessionEnded />
    </ActorProvider>
  )
}
