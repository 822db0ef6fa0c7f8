import type { ReactNode } from 'react'
import { ActorProvider } from '@/components/shell/actor-context'
import { SessionEnded } from '@/components/shell/session-ended'
import { SignInFirst } from '@/components/shell/sign-in-first'
import { chooseMembershipAction } from '@/lib/server/http/form-actions'
import { currentSession } from '@/lib/server/http/session'

/** Everything behind the sign-in. Each page draws its own running head, since each has something else to put there. */
export default async function WorkspaceLayout({ children }: { children: ReactNode }) {
  const session = await currentSession()
  if (!session) return <SignInFirst />
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
