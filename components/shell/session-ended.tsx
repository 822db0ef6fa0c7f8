'use client'

import { useQueryClient } from '@tanstack/react-query'
import { useRouter } from 'next/navigation'
import { useSyncExternalStore } from 'react'
import { SignInForm } from '../account/sign-in-form'
import { Dialog } from '../ui/dialog'
import { useActor } from './actor-context'

let ended = false
const watchers = new Set<() => void>()

/** Called by whatever learns from the server that nobody is signed in any more. */
export function reportSessionEnded(value = true): void {
  ended = value
  for (const watcher of watchers) watcher()
}

const watch = (onChange: () => void) => {
  watchers.add(onChange)
  return () => watchers.delete(onChange)
}

/** Signing in again over the page as it stands, so that nothing typed is lost. */
export function SessionEnded() {
  const open = useSyncExternalStore(
    watch,
    () => ended,
    () => false,
  )
  const actor = useActor()
  const queries = useQueryClient()
  const router = useRouter()
  return (
    <Dialog
      open={open}
      onClose={() => reportSessionEnded(false)}
      title="Your session has ended"
      closeLabel="Not now"
    >
      <p className="mb-4 text-ink-2">Sign in again to go on. What is on the screen stays as it is.</p>
      <SignInForm
        email={actor?.email}
        onSignedIn={() => {
          reportSessionEnded(false)
          void queries.invalidateQueries()
          router.refresh()
        }}
      />
    </Dialog>
  )
}
