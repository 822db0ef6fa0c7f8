'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { NextReading } from '@/diagrams/faults/answer'
import { capital } from '@/lib/client/meter/reading-words'
import { Button } from '../ui/button'
import { Dialog } from '../ui/dialog'
import { Tick } from '../ui/glyphs'
import { ConnectorFace } from './connector-face'
import { connectorOf, nextEffort, nextHow, nextTitle } from './next-words'
import { OutcomeCards } from './outcome-cards'
import type { MeterWork } from './use-meter'

/** The reading to take next, what each outcome would leave, and one key that sets the meter for it. */
export function NextSplit({
  circuit,
  next,
  others,
  meter,
  onChoose,
}: {
  circuit: Circuit
  next: NextReading
  others: readonly NextReading[]
  meter: MeterWork
  /** Takes another of the readings offered as the next one, and sets the meter for it. */
  onChoose: (next: NextReading) => void
}) {
  const [listing, setListing] = useState(false)
  const face = connectorOf(circuit, next.red ?? next.pin ?? '')
  return (
    <section aria-labelledby="next-split" className="flex min-h-full flex-col gap-2">
      <div className="flex gap-3">
        <div className="min-w-0 flex-1">
          <p className="truncate text-small leading-tight" title={nextEffort(circuit, next)}>
            <span id="next-split" className="text-body font-bold">
              Next split
            </span>{' '}
            <span className="text-ink-2">{nextEffort(circuit, next)}</span>
          </p>
          <h2 className="mt-1 text-title">{capital(nextTitle(circuit, next))}</h2>
          <p className="mt-0.5 text-dense text-ink-2">{nextHow(circuit, next)}</p>
        </div>
        {face && (
          <ConnectorFace circuit={circuit} connector={face.connector} cavity={face.cavity} width={124} />
        )}
      </div>
      <OutcomeCards
        circuit={circuit}
        outcomes={next.outcomes}
        lit={meter.lit}
        outside={meter.outside}
        look="cards"
      />
      <p className="sr-only">{next.says}</p>
      <div className="sticky -bottom-2.5 mt-auto flex flex-wrap items-center gap-2 bg-tray py-1.5">
        {meter.setForNext ? (
          <p className="flex flex-1 items-center gap-2 text-dense font-bold">
            <Tick size={18} /> The meter is set for this
          </p>
        ) : (
          <Button look="filled" className="flex-1" onClick={() => onChoose(next)}>
            Set the meter for this
          </Button>
        )}
        {others.length > 0 && (
          <Button onClick={() => setListing(true)}>
            {others.length} other {others.length === 1 ? 'reading' : 'readings'}
          </Button>
        )}
      </div>
      <Dialog open={listing} onClose={() => setListing(false)} title="Other readings worth taking">
        <ul className="max-h-[60dvh] overflow-y-auto border-t border-line">
          {others.map((other) => (
            <li key={other.says} className="flex items-center gap-3 border-b border-line py-2">
              <span className="min-w-0 flex-1">
                <b className="block">{capital(nextTitle(circuit, other))}</b>
                <span className="block text-small text-ink-2">
                  {nextHow(circuit, other)} {capital(nextEffort(circuit, other))}.{' '}
                  {other.outcomes
                    .map((outcome) => `${capital(outcome.about)}: leaves ${outcome.leaves.length}.`)
                    .join(' ')}
                </span>
              </span>
              <Button
                onClick={() => {
                  setListing(false)
                  onChoose(other)
                }}
              >
                Take this one
              </Button>
            </li>
          ))}
        </ul>
      </Dialog>
    </section>
  )
}
