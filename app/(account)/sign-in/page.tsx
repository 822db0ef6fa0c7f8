import type { Metadata } from 'next'
import Link from 'next/link'
import { AccountPage } from '@/components/account/account-page'
import { SignInPanel } from '@/components/account/sign-in-panel'
import { Band } from '@/components/ui/band'
import { wayBack } from '@/lib/shared/way-back'

export const metadata: Metadata = { title: 'Sign in' }

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<{ to?: string | string[]; ended?: string | string[] }>
}) {
  const { to, ended } = await searchParams
  return (
    <AccountPage
      at="sign-in"
      title="Sign in"
      caption={
        <>
          No account yet? <Link href="/sign-up">Make one for the shop or school</Link>.
        </>
      }
    >
      {ended !== undefined && (
        <Band kind="note" title="Sign in to go on." className="mb-4">
          The session has ended, or the page needs someone signed in.
        </Band>
      )}
      <SignInPanel to={wayBack(to)} />
    </AccountPage>
  )
}
