import { cookies } from 'next/headers'
import { cache } from 'react'
import type { Actor, Context } from '../context'
import { database } from '../database'
import type { Session } from '../use-cases/account/open-session'
import { contextFor } from './context-for'
import { sessionCookieName, sessionOfCookie } from './session-cookie'

/** Who looks at this page, with all organisations they may work in; null when signed out. Asked once a request. */
export const currentSession: () => Promise<Session | null> = cache(async () => {
  const jar = await cookies()
  return sessionOfCookie(database(), jar.get(sessionCookieName())?.value)
})

export async function currentActor(): Promise<Actor | null> {
  return (await currentSession())?.actor ?? null
}

/** What a page hands to a use case; null when signed out. */
export async function currentContext(): Promise<Context | null> {
  const actor = await currentActor()
  return actor ? contextFor(actor) : null
}
