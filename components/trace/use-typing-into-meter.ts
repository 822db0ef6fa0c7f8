import { type RefObject, useEffect, useRef } from 'react'
import type { MeterAction } from '@/lib/client/meter/meter-state'

/** Digits typed anywhere go to the window at once. */
export function useTypingIntoMeter(
  field: RefObject<HTMLInputElement | null>,
  act: (action: MeterAction) => void,
  enabled: boolean,
) {
  const latest = useRef(act)
  useEffect(() => {
    latest.current = act
  })
  useEffect(() => {
    if (!enabled) return
    const type = (event: KeyboardEvent) => {
      if (event.ctrlKey || event.metaKey || event.altKey || !/^[0-9.,]$/.test(event.key)) return
      const target = event.target
      if (!(target instanceof HTMLElement) || document.querySelector('dialog[open]')) return
      const other = target.closest('input, textarea, select')
      if (other instanceof HTMLInputElement ? !['radio', 'checkbox'].includes(other.type) : other) return
      event.preventDefault()
      latest.current({ do: 'press', key: event.key === ',' ? '.' : event.key })
      field.current?.focus()
    }
    document.addEventListener('keydown', type, true)
    return () => document.removeEventListener('keydown', type, true)
  }, [enabled, field])
}
