'use client'

import { useState } from 'react'
import { distanceToFault } from '@/diagrams/distance-to-fault'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import { numberedReadings } from '@/lib/client/evaluator/numbered-readings'
import { Button } from '../../ui/button'
import { Dialog } from '../../ui/dialog'
import { likeliestMode } from '../likeliest-mode'
import { siteTitle } from '../site-words'
import { DistanceFields } from './distance-fields'

/**
 * Where a wire's short has been located, how far along it lies: from the trace's own readings where they say it, else
 * from what is measured for it. Nothing where no wire is shorted.
 */
export function DistanceToFault({
  circuit,
  readings,
  answer,
}: {
  circuit: Circuit
  readings: readonly Reading[]
  answer: Answer
}) {
  const [open, setOpen] = useState(false)
  const short = shortedWire(answer)
  if (!short) return null
  const known = distanceToFault({ circuit, wire: short.wire, readings: numberedReadings(readings) })
  return (
    <>
      <Button onClick={() => setOpen(true)}>Distance to the fault</Button>
      <Dialog
        open={open}
        onClose={() => setOpen(false)}
        title={`Distance to the fault: ${siteTitle(circuit, `wire:${short.wire}`)}`}
        className="max-w-2xl"
      >
        {known.ok && known.value.useful && (
          <p className="mb-3 border-b border-line pb-3">
            <b>
              {known.value.says} By {known.value.readings.join(', ')} of this trace.
            </b>
          </p>
        )}
        <DistanceFields circuit={circuit} wire={short.wire} other={short.other} />
      </Dialog>
    </>
  )
}

/** The wire whose short was located, and the one it touches. */
export function shortedWire(answer: Answer): { wire: string; other: string | null } | null {
  for (const site of answer.sites) {
    if (site.verdict !== 'faulty' || !site.site.startsWith('wire:')) continue
    const mode = likeliestMode(site)
    if (mode?.mode.startsWith('short-to-'))
      return { wire: site.site.slice('wire:'.length), other: mode.other }
  }
  return null
}
