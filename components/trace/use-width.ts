import { type RefObject, useEffect, useRef, useState } from 'react'

/** The width in px of an element as it changes; `assumed` until it is known. */
export function useWidth<E extends HTMLElement>(assumed: number): [RefObject<E | null>, number] {
  const ref = useRef<E>(null)
  const [width, setWidth] = useState(assumed)
  useEffect(() => {
    const element = ref.current
    if (!element) return
    const measure = () => {
      const { width: measured } = element.getBoundingClientRect()
      if (measured > 0) setWidth(measured)
    }
    measure()
    const observer = new ResizeObserver(measure)
    observer.observe(element)
    return () => observer.disconnect()
  }, [])
  return [ref, width]
}
