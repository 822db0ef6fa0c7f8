'use client'

import { useRouter } from 'next/navigation'
import { type FormEvent, useState } from 'react'
import { type SignUp, signUpSchema } from '@/lib/shared/api/account'
import type { Result } from '@/lib/shared/result'
import { Band } from '../ui/band'
import { Button } from '../ui/button'
import { Choice } from '../ui/choice'
import { Field } from '../ui/field'
import { signInWith } from './sign-in-with'
import { fieldSentence, useCheckedForm } from './use-checked-form'

type Kind = NonNullable<SignUp['kind']>
const kinds = [
  { value: 'shop', label: 'Shop' },
  { value: 'school', label: 'School' },
  { value: 'both', label: 'Both' },
] as const satisfies readonly { value: Kind; label: string }[]

type FieldName = 'organisation' | 'name' | 'email' | 'password'

export function SignUpForm({ action }: { action: (input: SignUp) => Promise<Result<unknown>> }) {
  const router = useRouter()
  const [kind, setKind] = useState<Kind>('shop')
  const form = useCheckedForm<FieldName>(signUpSchema, {
    organisation: '',
    name: '',
    email: '',
    password: '',
  })
  const [failure, setFailure] = useState<string | null>(null)
  const [sending, setSending] = useState(false)

  async function send(event: FormEvent) {
    event.preventDefault()
    setFailure(null)
    if (!form.check()) return
    setSending(true)
    try {
      const made = await action({ ...form.values, kind })
      if (!made.ok) {
        const { path, message } = made.failure
        if (made.failure.code === 'address-taken') form.refuse('email', message)
        else if (path && path in form.values) form.refuse(path as FieldName, fieldSentence(message))
        else setFailure(message)
        return
      }
      const refused = await signInWith(form.values.email, form.values.password)
      if (refused) return setFailure(`The account is made, but signing in did not work. ${refused}`)
      router.replace('/circuits')
      router.refresh()
    } catch {
      setFailure('The server did not answer. What you typed is still here. Try again when it is back.')
    } finally {
      setSending(false)
    }
  }

  return (
    // Sent before the page has woken up, a form must not put a password into the address: hence post.
    <form method="post" onSubmit={send} noValidate className="flex flex-col gap-4">
      {failure && <Band title={failure} />}
      <Choice label="What it is" options={kinds} value={kind} onChange={setKind} fill size="bay" />
      <Field
        label={kind === 'school' ? 'Name of the school' : kind === 'shop' ? 'Name of the shop' : 'Name'}
        autoComplete="organization"
        {...form.fieldProps('organisation')}
      />
      <Field label="Your name" autoComplete="name" {...form.fieldProps('name')} />
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
        autoComplete="new-password"
        hint="At least 10 characters. A short sentence is easier to keep than a hard word."
        {...form.fieldProps('password')}
      />
      <Button type="submit" look="filled" size="bay" disabled={sending}>
        {sending ? 'Making the account' : 'Make the account'}
      </Button>
    </form>
  )
}
