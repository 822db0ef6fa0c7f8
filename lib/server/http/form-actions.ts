'use server'

import { cookies } from 'next/headers'
import { fail, type Result, succeed } from '@/lib/shared/result'
import type { ChooseMembership, SignUp } from '@/lib/shared/api/account'
import { env } from '../env'
import { chooseMembership } from '../use-cases/account/choose-membership'
import { signUp } from '../use-cases/account/sign-up'
import { attempt } from './attempt'
import { contextFor, openContext } from './context-for'
import { currentActor } from './session'
import { isSecure, sealSession, sessionCookieName, sessionSeconds } from './session-cookie'

/** Makes an organisation with its first owner. The form then signs in with what was typed. */
export async function signUpAction(input: SignUp): Promise<Result<null>> {
  return attempt(async () => {
    const made = await signUp(openContext(), input)
    return made.ok ? succeed(null) : made
  })
}

/** Changes the organisation one works in: the session goes on under a claim for the other membership. */
export async function chooseMembershipAction(input: ChooseMembership): Promise<Result<null>> {
  return attempt(async () => {
    const actor = await currentActor()
    if (!actor) return fail('not-signed-in')
    const claim = await chooseMembership(contextFor(actor), input, { secret: env().NEXTAUTH_SECRET })
    if (!claim.ok) return claim
    const jar = await cookies()
    jar.set(sessionCookieName(), await sealSession(claim.value, actor), {
      httpOnly: true,
      sameSite: 'lax',
      path: '/',
      secure: isSecure(),
      maxAge: sessionSeconds,
    })
    return succeed(null)
  })
}
