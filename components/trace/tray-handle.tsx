'use client'

import { type PointerEvent, useRef } from 'react'

/** Heights in px that the tray can be pulled to on a wide screen. */
export const trayHeights = [180, 276, 420] as const
export type TrayHeight = (typeof trayHeights)[number]

/** The upper edge of the tray: pulled with a finger, or moved with the arrow keys. */
export function TrayHandle({ height, onPull }: { height: TrayHeight; onPull: (height: TrayHeight) => void }) {
  const from = useRef<{ y: number; height: number } | null>(null)
  const nearest = (wanted: number): TrayHeight =>
    trayHeights.reduce((best, one) => (Math.abs(one - wanted) < Math.abs(best - wanted) ? one : best))
  const step = (by: number) => {
    const next = trayHeights[trayHeights.indexOf(height) + by]
    if (next !== undefined) onPull(next)
  }
  const move = (event: PointerEvent) => {
    if (from.current) onPull(nearest(from.current.height + from.current.y - event.clientY))
  }
  return (
    <div
      role="separator"
      tabIndex={0}
      aria-orientation="horizontal"
      aria-label="Height of the tray"
      aria-valuemin={trayHeights[0]}
      aria-valuemax={trayHeights[2]}
      aria-valuenow={height}
      className="absolute inset-x-0 -top-3 z-controls mx-auto hidden h-6 w-24 cursor-row-resize touch-none items-center justify-center laptop:flex"
      onPointerDown={(event) => {
        from.current = { y: event.clientY, height }
        event.currentTarget.setPointerCapture(event.pointerId)
      }}
      onPointerMove={move}
      onPointerUp={() => {
        from.current = null
      }}
      onKeyDown={(event) => {
        const by = event.key === 'ArrowUp' ? 1 : event.key === 'ArrowDown' ? -1 : 0
        if (by === 0) return
        event.preventDefault()
        step(by)
      }}
    >
      <span aria-hidden="true" className="h-2 w-12 rounded-full border-control border-ink bg-panel" />
    </div>
  )
}
