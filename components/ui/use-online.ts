'use client'

import { useSyncExternalStore } from 'react'

function watch(onChange: () => void) {
  addEventListener('online', onChange)
  addEventListener('offline', onChange)
  return () => {
    removeEventListener('online', onChange)
    removeEventListener('offline', onChange)
  }
}

/** False when the device itself knows of no network; a server may still be away. */
export function useOnline(): boolean {
  return useSyncExternalStore(
    watch,
    () => navigator.onLine,
    () => true,
  )
}
