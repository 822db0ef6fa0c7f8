'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { siteName } from '@/diagrams/document/sites'
import type { Answer, NextReading } from '@/diagrams/faults/answer'
import { conditionWords, measuredWords, valueWords } from '@/lib/client/meter/reading-words'
import { Button } from '../ui/button'
import { RuledLines } from '../ui/ruled-lines'
import { DistanceToFault } from './distance/distance-to-fault'
import { PngButton } from './export/png-button'
import { NextSplit } from './next-split'
import { modeWords } from './site-words'
import type { MeterWork } from './use-meter'
import type { TraceWork } from './use-trace'
import { VerdictCard } from './verdict-card'

/** The right of the tray: the next split while places are left, then what was found and how it is proved. */
export function TraceResult({
  circuit,
  work,
  answer,
  current,
  next,
  others,
  meter,
  onChoose,
  onFinish,
}: {
  circuit: Circuit
  work: TraceWork
  answer: Answer | null
  current: boolean
  next: NextReading | null
  others: readonly NextReading[]
  meter: MeterWork
  onChoose: (next: NextReading) => void
  onFinish: () => void
}) {
  const { trace, readings } = work
  const png = <PngButton circuit={circuit} trace={trace} readings={readings} answer={answer} />
  if (trace.state === 'done') return <Done circuit={circuit} work={work} answer={answer} />
  if (!answer) return <RuledLines rows={3} label="Working out the next split" />
  if (readings.length > 0 && (answer.outcome === 'located' || answer.outcome === 'no-fault'))
    return (
      <VerdictCard
        circuit={circuit}
        answer={answer}
        actions={
          <>
            <Button look="filled" className="grow basis-52" onClick={onFinish}>
              {trace.finding ? 'Prove the repair' : 'Record and prove the repair'}
            </Button>
            <DistanceToFault circuit={circuit} readings={readings} answer={answer} />
            {png}
          </>
        }
      />
    )
  if (readings.length > 0 && (answer.outcome === 'cannot-be' || answer.outcome === 'two-faults') && !next)
    return <VerdictCard circuit={circuit} answer={answer} actions={png} />
  return (
    <div className="flex min-h-full flex-col gap-2">
      {next ? (
        <NextSplit circuit={circuit} next={next} others={others} meter={meter} onChoose={onChoose} />
      ) : (
        <p className="text-ink-2">{current ? answer.says : 'Working out the next split.'}</p>
      )}
      {readings.length > 0 && (
        <div className="flex flex-wrap items-center gap-2 border-t border-line pt-2">
          <p className="min-w-40 flex-1 text-small text-ink-2">{answer.says}</p>
          <Button onClick={onFinish}>{trace.finding ? 'Prove the repair' : 'Found it already'}</Button>
          {png}
        </div>
      )}
    </div>
  )
}

function Done({ circuit, work, answer }: { circuit: Circuit; work: TraceWork; answer: Answer | null }) {
  const { finding, proof } = work.trace
  return (
    <section aria-labelledby="done" className="flex min-h-full flex-col gap-2" data-testid="trace-done">
      <h2 id="done" className="text-title">
        The repair is proved
      </h2>
      {finding && (
        <p>
          <b>Found:</b>{' '}
          {finding.site && finding.mode
            ? `${siteName(circuit, finding.site)}, ${modeWords[finding.mode]}`
            : 'nothing wrong in the conditions tried'}
          . {finding.repaired ? 'Repaired.' : ''} {finding.note}
        </p>
      )}
      {proof && (
        <p className="text-ink-2">
          <b className="text-ink">Proof:</b> {measuredWords(circuit, proof.reading)},{' '}
          {conditionWords(circuit, proof.reading.condition)}:{' '}
          <span className="figures font-bold text-ink">
            {valueWords(proof.reading.kind, proof.reading.value)}
          </span>
          . The circuit works.
        </p>
      )}
      <div className="mt-auto">
        <PngButton circuit={circuit} trace={work.trace} readings={work.readings} answer={answer} />
      </div>
    </section>
  )
}
