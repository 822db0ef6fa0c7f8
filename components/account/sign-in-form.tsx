'use client'

import { type FormEvent, useState } from 'react'
import { signInSchema } from '@/lib/shared/api/account'
import { Band } from '../ui/band'
import { Button } from '../ui/button'
import { Field } from '../ui/field'
import { signInWith } from './sign-in-with'
import { useCheckedForm } from './use-checked-form'

export function SignInForm({ email = '', onSignedIn }: { email?: string; onSignedIn: () => void }) {
  const form = useCheckedForm(signInSchema, { email, password: '' })
  const [failure, setFailure] = useState<string | null>(null)
  const [sending, setSending] = useState(false)

  async function send(event: FormEvent) {
    event.preventDefault()
    setFailure(null)
    if (!form.check()) return
    setSending(true)
    const sentence = await signInWith(form.values.email, form.values.password)
    setSending(false)
    if (sentence) setFailure(sentence)
    else onSignedIn()
  }

  return (
    // Sent before the page has woken up, a form must not put a password into the address: hence post.
    <form method="post" onSubmit={send} noValidate className="flex flex-col gap-4">
      {failure && <Band title={failure} />}
      <Field
        label="E-mail"
        type="email"
        autoComplete="username"
        inputMode="email"
        {...form.fieldProps('email')}
      />
      <Field
        label="Password"
        type="password"
        autoComplete="current-password"
        {...form.fieldProps('password')}
      />
      <Button type="submit" look="filled" size="bay" disabled={sending}>
        {sending ? 'Signing in' : 'Sign in'}
      </Button>
    </form>
  )
}
