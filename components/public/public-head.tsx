import Link from 'next/link'
import { ButtonLink } from '../ui/button'
import { Wordmark } from '../ui/wordmark'

/** The running head for whoever is not signed in. */
export function PublicHead({ at }: { at?: 'sign-in' | 'sign-up' }) {
  return (
    <header className="double-rule z-head flex min-h-[3.75rem] laptop:min-h-[3.25rem] items-center gap-2 bg-panel px-3 tablet:px-5">
      <Link href="/" className="flex min-h-target items-center no-underline">
        <Wordmark />
      </Link>
      <nav aria-label="Account" className="ml-auto flex items-center gap-2">
        {at !== 'sign-in' && <ButtonLink href="/sign-in">Sign in</ButtonLink>}
        {at !== 'sign-up' && (
          // On a phone the landing page has the same button right below.
          <div className={at ? '' : 'hidden tablet:block'}>
            <ButtonLink href="/sign-up" look="filled">
              Make an account
            </ButtonLink>
          </div>
        )}
      </nav>
    </header>
  )
}
