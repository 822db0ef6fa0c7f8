'use client'

import { usePathname, useRouter, useSearchParams } from 'next/navigation'
import { useEffect } from 'react'
import { ButtonLink } from '../ui/button'
import { MessagePage } from './page-states'

/** In place of a page that needs someone signed in: on to the sign-in, which knows the way back here. */
export function SignInFirst() {
  const router = useRouter()
  const path = usePathname()
  const query = useSearchParams().toString()
  const to = query === '' ? path : `${path}?${query}`
  const address = `/sign-in?ended=1&to=${encodeURIComponent(to)}`
  useEffect(() => router.replace(address), [router, address])
  return (
    <MessagePage
      title="Sign in to go on"
      actions={
        <ButtonLink href={address} look="filled" size="bay">
          Sign in
        </ButtonLink>
      }
    >
      <p>This page belongs to a shop or school.</p>
    </MessagePage>
  )
}
