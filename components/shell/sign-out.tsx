'use client'

import { signOut } from 'next-auth/react'
import { useState } from 'react'
import { Band } from '../ui/band'
import { Button } from '../ui/button'

export function SignOut() {
  const [state, setState] = useState<'idle' | 'leaving' | 'failed'>('idle')
  return (
    <>
      {state === 'failed' && (
        <Band
          className="mb-3"
          title="Not signed out. The server did not answer. Try again when it is back."
        />
      )}
      <Button
        className="w-full"
        disabled={state === 'leaving'}
        onClick={() => {
          setState('leaving')
          signOut({ callbackUrl: '/' }).catch(() => setState('failed'))
        }}
      >
        Sign out
      </Button>
    </>
  )
}
