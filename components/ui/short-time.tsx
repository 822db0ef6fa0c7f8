'use client'

import { useSyncExternalStore } from 'react'

const never = () => () => undefined

/** True once the page runs in the browser: only there the reader's clock and zone are known. */
function useOnDevice(): boolean {
  return useSyncExternalStore(
    never,
    () => true,
    () => false,
  )
}

/** Today "14:02", within six days "Mon", else "3 Nov" with the year when it is another. */
export function shortTime(at: Date, now: Date): string {
  const midnight = new Date(now.getFullYear(), now.getMonth(), now.getDate())
  const days =
    (midnight.getTime() - new Date(at.getFullYear(), at.getMonth(), at.getDate()).getTime()) / 864e5
  if (Math.round(days) === 0)
    return `${String(at.getHours()).padStart(2, '0')}:${String(at.getMinutes()).padStart(2, '0')}`
  if (days > 0 && Math.round(days) <= 6) return at.toLocaleDateString('en-GB', { weekday: 'short' })
  return at.toLocaleDateString('en-GB', {
    day: 'numeric',
    month: 'short',
    year: at.getFullYear() === now.getFullYear() ? undefined : 'numeric',
  })
}

export function ShortTime({ at, className }: { at: string; className?: string }) {
  const onDevice = useOnDevice()
  return (
    <time dateTime={at} className={className}>
      {onDevice ? shortTime(new Date(at), new Date()) : ''}
    </time>
  )
}
