'use client'

import { type ReactNode, useSyncExternalStore } from 'react'

const never = () => () => {}

/**
 * Renders its children in the browser alone. Drawing a circuit takes longer than linearly in its parts: done on the
 * server as well, one large circuit would hold up everybody else's pages.
 */
export function InBrowser({ waiting, children }: { waiting: ReactNode; children: ReactNode }) {
  const here = useSyncExternalStore(
    never,
    () => true,
    () => false,
  )
  return here ? children : waiting
}
