'use client'

import { useRouter } from 'next/navigation'
import { SignInForm } from './sign-in-form'

/** The form on its own page: afterwards one goes on where one was. */
export function SignInPanel({ to }: { to: string }) {
  const router = useRouter()
  return (
    <SignInForm
      onSignedIn={() => {
        router.replace(to)
        // What was rendered for a stranger must not be shown to a member.
        router.refresh()
      }}
    />
  )
}
