'use client'

import { type KeyboardEvent, type MouseEvent, useRef, useState } from 'react'
import { useStore } from 'reactflow'
import type { PointPlace } from './point-place'

/**
 * A button on every point, 44 px on the screen at any size of the sheet. One of them is in the tab order; the square
 * brackets and the arrow keys walk to its neighbours, Enter puts the lead there.
 */
export function SheetPoints({
  places,
  spoken,
  onPick,
  held,
}: {
  places: readonly PointPlace[]
  spoken: (point: string) => string
  onPick: (point: string, event: MouseEvent) => void
  /** Points that a lead is on. */
  held: readonly string[]
}) {
  const zoom = useStore((state) => state.transform[2])
  const [at, setAt] = useState(0)
  const box = useRef<HTMLDivElement>(null)
  const current = Math.min(at, places.length - 1)

  const walk = (event: KeyboardEvent) => {
    const step = event.key === ']' ? 1 : event.key === '[' ? -1 : 0
    if (step === 0 || places.length === 0) return
    event.preventDefault()
    event.stopPropagation()
    const next = (current + step + places.length) % places.length
    setAt(next)
    box.current?.querySelectorAll<HTMLButtonElement>('button')[next]?.focus()
  }

  return (
    <div ref={box} role="group" aria-label="Points of the circuit" onKeyDown={walk}>
      {places.map((place, index) => (
        <button
          key={place.point}
          type="button"
          data-point={place.point}
          tabIndex={index === current ? 0 : -1}
          aria-label={spoken(place.point)}
          aria-pressed={held.includes(place.point)}
          className="absolute rounded-full"
          style={{
            left: place.x,
            top: place.y,
            width: 44,
            height: 44,
            transform: `translate(-50%, -50%) scale(${1 / zoom})`,
            pointerEvents: 'all',
            background: 'transparent',
            border: 0,
          }}
          onFocus={() => setAt(index)}
          onClick={(event) => {
            event.stopPropagation()
            onPick(place.point, event)
          }}
        />
      ))}
    </div>
  )
}
