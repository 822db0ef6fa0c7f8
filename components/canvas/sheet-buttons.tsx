'use client'

import { Button } from '../ui/button'
import { Minus, Plus } from '../ui/glyphs'
import type { SheetView } from './sheet-view'

/** Over the sheet at the right: fit, smaller, larger. */
export function SheetButtons({ view, anyLeft }: { view: SheetView; anyLeft: boolean }) {
  return (
    <div className="absolute right-3 z-controls flex gap-2 bottom-3 laptop:bottom-auto laptop:top-2.5 laptop:right-4">
      {anyLeft && (
        <Button onClick={() => view.fit('whole')} className="max-laptop:hidden">
          Whole sheet
        </Button>
      )}
      <Button onClick={() => view.fit(anyLeft ? 'left' : 'whole')} className="min-h-target laptop:min-h-11">
        {anyLeft ? 'Fit what is left' : 'Whole sheet'}
      </Button>
      <Button aria-label="Smaller" onClick={() => view.zoomBy(0.8)} className="px-3">
        <Minus />
      </Button>
      <Button aria-label="Larger" onClick={() => view.zoomBy(1.25)} className="px-3">
        <Plus />
      </Button>
    </div>
  )
}
