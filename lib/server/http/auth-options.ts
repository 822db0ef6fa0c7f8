import type { NextAuthOptions } from 'next-auth'
import CredentialsProvider from 'next-auth/providers/credentials'
import { fail } from '@/lib/shared/result'
import { env } from '../env'
import { signIn } from '../use-cases/account/sign-in'
import { attempt } from './attempt'
import { clientAddress } from './client-address'
import { openContext } from './context-for'
import { claimOf, isSecure, sessionSeconds } from './session-cookie'
import { openSession } from '../use-cases/account/open-session'

/** How next-auth signs in and out; made anew for a request, since settings are read late. */
export function authOptions(): NextAuthOptions {
  const { NEXTAUTH_SECRET: secret } = env()
  return {
    secret,
    useSecureCookies: isSecure(),
    session: { strategy: 'jwt', maxAge: sessionSeconds },
    pages: { signIn: '/sign-in', error: '/sign-in' },
    providers: [
      CredentialsProvider({
        name: 'Password',
        credentials: { email: { type: 'email' }, password: { type: 'password' } },
        async authorize(credentials, request) {
          const { email, password } = credentials ?? {}
          const result = await attempt(() =>
            email === undefined || password === undefined
              ? Promise.resolve(fail('wrong-sign-in'))
              : signIn(
                  openContext(),
                  { email, password },
                  { secret, address: clientAddress(request.headers) },
                ),
          )
          // The form says the sentence that belongs to the code.
          if (!result.ok)
            throw new Error(result.failure.code === 'invalid' ? 'wrong-sign-in' : result.failure.code)
          return { ...result.value, id: result.value.userId }
        },
      }),
    ],
    callbacks: {
      jwt: ({ token, user }) =>
        user && 'stamp' in user && 'organisationId' in user
          ? { ...token, sub: user.id, organisationId: user.organisationId, stamp: user.stamp }
          : token,
      async session({ session, token }) {
        const claim = claimOf(token)
        const known = claim && (await openSession(openContext().db, secret, claim))
        return known ? session : { expires: new Date(0).toISOString() }
      },
    },
    logger: { error: () => {}, warn: () => {}, debug: () => {} },
  }
}
