'use client'

import { useMemo } from 'react'
import { CircuitSheet } from '../canvas/circuit-sheet'
import { CautionPlate } from './cautions'
import { CountLegend } from './count-legend'
import { PlaceNote } from './place-note'
import { traceOverlay } from './trace-overlay'
import type { TraceSession } from './use-trace-session'

/** The drawing with verdicts, flags and leads; counts and cautions over it, a note on the picked place. */
export function TraceSheet({ session }: { session: TraceSession }) {
  const { circuit, readings, answer, current, counts, started, located, meter, next, site, work } = session
  const { condition, kind, red, black } = meter.state
  const overlay = useMemo(
    () => traceOverlay({ circuit, readings, answer, condition, next: located ? null : next }),
    [circuit, readings, answer, condition, next, located],
  )
  const picked = answer?.sites.find((one) => one.site === site) ?? null
  return (
    <div className="relative min-h-52 flex-1 tablet:min-h-64 max-tablet:h-64 max-tablet:flex-none">
      <CircuitSheet
        circuit={circuit}
        overlay={overlay}
        picked={site?.startsWith('wire:') ? site.slice('wire:'.length) : null}
        leads={kind === 'volts' || kind === 'ohms' ? { red, black } : undefined}
        onPick={session.pick}
        fitAgain={`${readings.length} ${current} ${answer?.outcome}`}
        label="Sheet: tap two points to set the leads"
        legend={
          <div className="flex flex-wrap items-center gap-3">
            <CountLegend counts={counts} started={started} />
            <CautionPlate
              cautions={circuit.cautions}
              answered={work.cautionsAnswered}
              onOpen={() => session.setAskingCautions(true)}
            />
          </div>
        }
      />
      {picked && (
        <PlaceNote circuit={circuit} site={picked} started={started} onClose={() => session.setSite(null)} />
      )}
    </div>
  )
}
