'use client'

import { Button, ButtonLink } from '../ui/button'
import { MessagePage } from './page-states'

/** What is shown when a page could not be made; the cause stays in the server's log under the digest. */
export function ErrorScreen({ error, reset }: { error: Error & { digest?: string }; reset: () => void }) {
  return (
    <MessagePage
      title="This page could not be shown"
      actions={
        <>
          <Button look="filled" size="bay" onClick={reset}>
            Try again
          </Button>
          <ButtonLink href="/circuits" size="bay">
            To Circuits
          </ButtonLink>
        </>
      }
    >
      <p>
        Nothing was changed, and what was saved is safe. The server or its database may be away for a moment.
      </p>
      {error.digest && <p className="mt-2 text-small">In the server's log: {error.digest}</p>}
    </MessagePage>
  )
}
