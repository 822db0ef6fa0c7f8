'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import type { Reading } from '@/diagrams/document/reading-schema'
import type { Answer, ReadingAnswer } from '@/diagrams/faults/answer'
import { readingNumber } from '@/lib/client/evaluator/numbered-readings'
import { conditionWords, measuredWords, movedWords, valueWords } from '@/lib/client/meter/reading-words'
import { Button } from '../ui/button'
import { classNames } from '../ui/class-names'
import { LeadGlyph } from '../ui/lead-glyph'
import { Plate } from '../ui/plate'

/** What has been read, newest first, each with what it says and what the good circuit would show. */
export function ReadingsList({
  circuit,
  readings,
  answer,
  canUndo,
  onUndo,
  canRedo,
  onRedo,
}: {
  circuit: Circuit
  readings: readonly Reading[]
  answer: Answer | null
  canUndo: boolean
  onUndo: () => void
  canRedo: boolean
  onRedo: () => void
}) {
  const told = new Map((answer?.readings ?? []).map((reading) => [reading.id, reading]))
  return (
    <section aria-labelledby="readings" className="flex min-h-0 flex-col">
      <div className="flex min-h-target items-center gap-2.5 px-3 pt-1 tablet:px-4">
        <h2 id="readings" className="text-body font-bold">
          Readings
        </h2>
        <span className="flex-1 text-small text-ink-2">
          {readings.length === 0 ? 'none yet' : `${readings.length}, newest first`}
        </span>
        {canRedo && (
          <Button look="text" onClick={onRedo}>
            Redo
          </Button>
        )}
        {canUndo && readings.length > 0 && (
          <Button look="text" onClick={onUndo}>
            Undo last
          </Button>
        )}
      </div>
      <ol
        aria-labelledby="readings"
        // Scrolls, and holds nothing that a key could land on.
        tabIndex={0}
        className="min-h-0 flex-1 overflow-y-auto border-t border-line"
        reversed
      >
        {readings
          .map((reading, index) => ({ reading, number: readingNumber(index) }))
          .toReversed()
          .map(({ reading, number }, row) => (
            <ReadingRow
              key={reading.id}
              circuit={circuit}
              reading={reading}
              number={number}
              told={told.get(number) ?? null}
              doubted={answer?.outcome === 'cannot-be' && answer.reading === number}
              newest={row === 0}
            />
          ))}
      </ol>
    </section>
  )
}

function ReadingRow({
  circuit,
  reading,
  number,
  told,
  doubted,
  newest,
}: {
  circuit: Circuit
  reading: Reading
  number: string
  told: ReadingAnswer | null
  doubted: boolean
  newest: boolean
}) {
  const expected = told?.expected
  return (
    <li
      className={classNames(
        'flex gap-3 border-b border-line px-3 py-2 tablet:px-4',
        newest && 'bg-window',
        doubted && 'outline-2 -outline-offset-2 outline-dashed outline-ink',
      )}
    >
      <Plate look="inverted" className="mt-0.5 h-6 flex-none px-1.5">
        {number}
      </Plate>
      <div className="min-w-0 flex-1">
        <p className="font-bold leading-tight *:[svg]:mr-1 *:[svg]:inline-block *:[svg]:align-[-4px]">
          {reading.kind === 'volts' || reading.kind === 'ohms' ? (
            <>
              <LeadGlyph lead="red" size={18} />
              {pointName(circuit, reading.red)} <span className="font-normal text-ink-2">to</span>{' '}
              <LeadGlyph lead="black" size={18} />
              {pointName(circuit, reading.black)}
            </>
          ) : (
            measuredWords(circuit, reading)
          )}
        </p>
        <p className="mt-0.5 text-small text-ink-2">
          {doubted ? `Take ${number} again: it fits no fault. ` : ''}
          {told?.says ?? conditionWords(circuit, reading.condition)}
        </p>
        {told && (
          <p className="text-note font-normal text-ink-3">{conditionWords(circuit, reading.condition)}</p>
        )}
      </div>
      <div className="flex-none text-right">
        <p className="figures text-lead">{valueWords(reading.kind, reading.value)}</p>
        {reading.moved && <p className="text-small text-ink-2">{movedWords(reading)}</p>}
        {expected !== undefined && expected !== null && (
          <p className="text-small text-ink-2">good: {valueWords(reading.kind, expected)}</p>
        )}
      </div>
    </li>
  )
}
