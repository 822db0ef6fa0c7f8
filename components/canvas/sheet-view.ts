import { useCallback, useEffect, useRef } from 'react'
import { getViewportForBounds, useReactFlow, useStoreApi } from 'reactflow'
import type { Box } from '@/diagrams/drawing/primitive'
import { faultyBounds, flagBounds, leftBounds, wholeBounds } from './sheet-bounds'
import type { Scene } from './scene'

export const leastZoom = 0.15
export const mostZoom = 3
/** On a phone a whole circuit would be too small to read: what is left is shown at this size at least. */
const leastPhoneZoom = 0.55
const phonePixels = 600
const laptopPixels = 1000
/** Fitting never makes the drawing larger than this, however little is left of it. */
const mostFitZoom = 1.3
/** Room for what stands over the sheet: counts at the left, buttons at the right. */
const headPixels = 52
/** On smaller sheets the buttons stand at the foot. */
const footPixels = 56

/** `auto`: the whole on a wide sheet, what is left on a narrow one. */
export type Fit = 'whole' | 'left' | 'auto'

export interface SheetView {
  /** Fits anew unless the person has moved the sheet. */
  settle: () => void
  fit: (fit: Fit) => void
  zoomBy: (factor: number) => void
  panBy: (x: number, y: number) => void
  /** The person moved the sheet: it stays where they put it. */
  moved: () => void
}

/** Moves the sheet: fits it when it appears, when its room changes and when asked. */
export function useSheetView(scene: Scene, first: Fit): SheetView {
  const flow = useReactFlow()
  const store = useStoreApi()
  const latest = useRef(scene)
  useEffect(() => {
    latest.current = scene
  })
  const wanted = useRef<Fit | null>(first)

  const show = useCallback(
    (fit: Fit) => {
      const { width, height } = store.getState()
      if (width === 0 || height === 0) return
      const narrow = fit === 'auto' && width < laptopPixels
      const box: Box =
        (narrow && width < phonePixels ? faultyBounds(latest.current) : null) ??
        (fit === 'left' || narrow ? leftBounds(latest.current) : null) ??
        (narrow && width < phonePixels ? flagBounds(latest.current) : null) ??
        wholeBounds(latest.current)
      const head = height > 240 ? headPixels : 0
      const foot = width < laptopPixels ? footPixels : 0
      const view = getViewportForBounds(
        box,
        width,
        height - head - foot,
        narrow && width < phonePixels ? leastPhoneZoom : leastZoom,
        mostFitZoom,
        0.02,
      )
      void flow.setViewport({ x: view.x, y: view.y + head, zoom: view.zoom })
    },
    [flow, store],
  )

  useEffect(() => {
    const node = store.getState().domNode
    if (!node) return
    const observer = new ResizeObserver(() => {
      // The store learns its size from an observer of its own.
      requestAnimationFrame(() => wanted.current && show(wanted.current))
    })
    observer.observe(node)
    return () => observer.disconnect()
  }, [store, show])

  const fit = useCallback(
    (what: Fit) => {
      wanted.current = what
      show(what)
    },
    [show],
  )
  return {
    fit,
    settle: useCallback(() => {
      if (wanted.current) show(wanted.current)
    }, [show]),
    zoomBy: useCallback(
      (factor) => {
        wanted.current = null
        void flow.zoomTo(Math.min(mostZoom, Math.max(leastZoom, flow.getZoom() * factor)))
      },
      [flow],
    ),
    panBy: useCallback(
      (x, y) => {
        wanted.current = null
        const view = flow.getViewport()
        void flow.setViewport({ ...view, x: view.x + x, y: view.y + y })
      },
      [flow],
    ),
    moved: useCallback(() => {
      wanted.current = null
    }, []),
  }
}
