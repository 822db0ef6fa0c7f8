'use client'

import { useRef, useState } from 'react'
import { createPortal, flushSync } from 'react-dom'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer } from '@/diagrams/faults/answer'
import type { Trace } from '@/lib/shared/api/traces'
import { Button } from '../../ui/button'
import { HandoutSheet } from './handout-sheet'
import { pictureName, pictureOf, saveFile } from './picture'

/** Draws the handout's sheet off the screen, makes a picture of it and saves that as a file. */
export function PngButton({
  circuit,
  trace,
  readings,
  answer,
  className,
}: {
  circuit: Circuit
  trace: Trace
  readings: readonly Reading[]
  answer: Answer | null
  className?: string
}) {
  const [making, setMaking] = useState<Date | null>(null)
  const [failed, setFailed] = useState(false)
  const sheet = useRef<HTMLDivElement>(null)

  const make = async () => {
    const date = new Date()
    setFailed(false)
    flushSync(() => setMaking(date))
    try {
      if (!sheet.current) throw new Error('The sheet was not drawn')
      saveFile(await pictureOf(sheet.current), pictureName(circuit.title, trace.codes[0] ?? null, date))
    } catch {
      setFailed(true)
    } finally {
      setMaking(null)
    }
  }
  return (
    <>
      <Button onClick={make} disabled={making !== null} className={className}>
        {making ? 'Making the PNG' : 'Save as PNG'}
      </Button>
      {failed && (
        <p role="alert" className="text-small font-semibold">
          The PNG could not be made. The trace is safe; try again.
        </p>
      )}
      {making &&
        createPortal(
          <div
            aria-hidden="true"
            style={{ position: 'fixed', left: 0, top: 0, zIndex: -1, pointerEvents: 'none' }}
          >
            <HandoutSheet
              circuit={circuit}
              trace={trace}
              readings={readings}
              answer={answer}
              date={making}
              sheetRef={sheet}
            />
          </div>,
          document.body,
        )}
    </>
  )
}
