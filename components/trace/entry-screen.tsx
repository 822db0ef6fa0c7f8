'use client'

import { useEffect, useRef } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { NextReading } from '@/diagrams/faults/answer'
import { capital } from '@/lib/client/meter/reading-words'
import { Button } from '../ui/button'
import { Chevron } from '../ui/glyphs'
import { Plate } from '../ui/plate'
import { ConnectorFace } from './connector-face'
import { MeterPanel } from './meter/meter-panel'
import { connectorOf, nextHow, nextTitle } from './next-words'
import { OutcomeCards } from './outcome-cards'
import type { MeterWork } from './use-meter'

/** A phone's whole screen for one reading: place and face, kind, leads, conditions, figure, outcomes, keys. */
export function EntryScreen({
  circuit,
  title,
  code,
  left,
  next,
  meter,
  onClose,
}: {
  circuit: Circuit
  title: string
  code: string | null
  /** "7 in question" */
  left: string
  next: NextReading | null
  meter: MeterWork
  onClose: () => void
}) {
  const dialog = useRef<HTMLDialogElement>(null)
  useEffect(() => {
    if (!dialog.current?.open) dialog.current?.showModal()
    // The figure is what one came for; its field calls up no keyboard, the keys stand below.
    dialog.current?.querySelector<HTMLElement>('[data-meter-window]')?.focus()
  }, [])
  const face = next ? connectorOf(circuit, next.red ?? '') : null
  return (
    <dialog
      ref={dialog}
      aria-label="Take the reading"
      onClose={onClose}
      className="m-0 h-dvh max-h-none w-screen max-w-none flex-col overflow-y-auto bg-tray text-ink open:flex tablet:hidden"
    >
      <header className="double-rule flex min-h-12 flex-none items-center gap-2 bg-panel px-2">
        <button
          type="button"
          aria-label="Back to the trace"
          onClick={onClose}
          className="flex min-h-target min-w-target items-center justify-center"
        >
          <Chevron direction="left" size={22} />
        </button>
        <h1 className="min-w-0 flex-1 truncate font-bold">{title}</h1>
        {code && <Plate>{code}</Plate>}
      </header>
      <div className="flex flex-none gap-3 border-b-2 border-ink bg-panel px-4 py-2">
        <div className="min-w-0 flex-1">
          <p className="text-dense font-bold">
            {left}
            {next && '. Next split:'}
          </p>
          {next && (
            <>
              <h2 className="text-title">{capital(nextTitle(circuit, next))}</h2>
              <p className="line-clamp-2 text-small leading-tight text-ink-2">
                {nextHow(circuit, next)} {face?.location ? capital(face.location) : ''}
              </p>
            </>
          )}
          {next && !meter.setForNext && (
            <Button look="text" onClick={() => meter.act({ do: 'set-for', next })}>
              Set the meter for this
            </Button>
          )}
        </div>
        {face && (
          <ConnectorFace circuit={circuit} connector={face.connector} cavity={face.cavity} width={130} />
        )}
      </div>
      <div className="flex flex-1 flex-col gap-2 p-3">
        <MeterPanel
          circuit={circuit}
          meter={meter}
          layout="screen"
          outcomes={
            meter.outcomes.length > 0 ? (
              <OutcomeCards
                circuit={circuit}
                outcomes={meter.outcomes}
                lit={meter.lit}
                outside={meter.outside}
                look="rows"
              />
            ) : null
          }
        />
      </div>
    </dialog>
  )
}
