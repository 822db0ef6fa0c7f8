'use client'

import { signIn } from 'next-auth/react'
import { errors } from '@/lib/shared/errors'

/** Null when signed in, else one plain sentence. Never throws: a server that does not answer is a sentence too. */
export async function signInWith(email: string, password: string): Promise<string | null> {
  const away = 'The server did not answer. What you typed is still here. Try again when it is back.'
  try {
    const answer = await signIn('credentials', { email, password, redirect: false })
    if (!answer) return away
    if (answer.ok && !answer.error) return null
    const code = answer.error ?? ''
    if (code in errors) return errors[code as keyof typeof errors].sentence
    if (code === 'CredentialsSignin') return errors['wrong-sign-in'].sentence
    return away
  } catch {
    return away
  }
}
