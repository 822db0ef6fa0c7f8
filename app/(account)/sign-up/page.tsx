import type { Metadata } from 'next'
import Link from 'next/link'
import { AccountPage } from '@/components/account/account-page'
import { SignUpForm } from '@/components/account/sign-up-form'
import { signUpAction } from '@/lib/server/http/form-actions'

export const metadata: Metadata = { title: 'Make an account' }

export default function SignUpPage() {
  return (
    <AccountPage
      at="sign-up"
      title="Make an account"
      caption={
        <>
          For a shop or a school. Already there? <Link href="/sign-in">Sign in</Link>.
        </>
      }
    >
      <SignUpForm action={signUpAction} />
    </AccountPage>
  )
}
