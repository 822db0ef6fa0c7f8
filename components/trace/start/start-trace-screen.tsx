'use client'

import { useQuery } from '@tanstack/react-query'
import Link from 'next/link'
import { useRouter } from 'next/navigation'
import { useRef, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Symptom } from '@/diagrams/faults/symptom-schema'
import { openTracesQuery, startTrace } from '@/lib/client/api/traces'
import { newId } from '@/lib/client/new-id'
import { traceCodeSchema } from '@/lib/shared/api/traces'
import { circuitModes } from '../../operate/circuit-modes'
import { ModeSwitch } from '../../shell/mode-switch'
import { RunningHead } from '../../shell/running-head'
import { Band } from '../../ui/band'
import { Button } from '../../ui/button'
import { Field, TextArea } from '../../ui/field'
import { Plate } from '../../ui/plate'
import { CodePicker } from './code-picker'
import { SymptomPicker } from './symptom-picker'

/** Before a trace: which vehicle, what is wrong with it, which codes it has set. */
export function StartTraceScreen({ circuitId, circuit }: { circuitId: string; circuit: Circuit }) {
  const router = useRouter()
  // One id for every attempt, so that a repeated start does not make a second trace.
  const id = useRef<string | null>(null)
  const [vehicle, setVehicle] = useState(circuit.vehicle)
  const [complaint, setComplaint] = useState('')
  const [codes, setCodes] = useState<string[]>([])
  const [symptoms, setSymptoms] = useState<Symptom[]>([])
  const [typed, setTyped] = useState('')
  const [codeError, setCodeError] = useState<string | null>(null)
  const [sending, setSending] = useState(false)
  const [failure, setFailure] = useState<string | null>(null)
  const open = useQuery(openTracesQuery(circuitId))

  const start = async () => {
    const all = [...codes]
    if (typed.trim() !== '') {
      const parsed = traceCodeSchema.safeParse(typed)
      if (!parsed.success) return setCodeError(parsed.error.issues[0]?.message ?? 'This is no trouble code.')
      if (!all.includes(parsed.data)) all.push(parsed.data)
    }
    setCodeError(null)
    setFailure(null)
    setSending(true)
    id.current ??= newId()
    const called = await startTrace({ id: id.current, circuitId, vehicle, complaint, codes: all, symptoms })
    if (called.ok) return router.push(`/circuits/${circuitId}/traces/${called.value.id}`)
    setSending(false)
    setFailure(called.failure.message)
  }

  return (
    <>
      <RunningHead
        circuit={{ title: circuit.title, vehicle: circuit.vehicle }}
        modes={<ModeSwitch modes={circuitModes(circuitId)} current="trace" />}
      />
      <main
        id="main"
        className="mx-auto grid max-w-5xl gap-x-10 gap-y-7 px-3 py-5 tablet:px-5 laptop:grid-cols-[3fr_2fr]"
      >
        <form
          className="grid content-start gap-3"
          noValidate
          onSubmit={(event) => {
            event.preventDefault()
            void start()
          }}
        >
          <h2 className="text-title">Start a trace</h2>
          {failure && <Band title={failure}>What is typed here stays.</Band>}
          <Field
            label="Vehicle"
            maxLength={120}
            value={vehicle}
            onChange={(event) => setVehicle(event.target.value)}
          />
          <TextArea
            label="Complaint"
            rows={3}
            maxLength={2000}
            hint="What the driver says, or what does not work."
            value={complaint}
            onChange={(event) => setComplaint(event.target.value)}
          />
          <SymptomPicker circuit={circuit} symptoms={symptoms} onChange={setSymptoms} />
          <CodePicker
            circuit={circuit}
            codes={codes}
            onChange={setCodes}
            typed={typed}
            onType={(text) => {
              setTyped(text)
              setCodeError(null)
            }}
            error={codeError}
          />
          <Button type="submit" look="filled" size="bay" disabled={sending}>
            {sending ? 'Starting' : 'Start the trace'}
          </Button>
        </form>
        <section aria-labelledby="left-open" className="content-start">
          <h2 id="left-open" className="border-b-2 border-ink pb-2 text-lead">
            Traces left open
          </h2>
          {open.data && open.data.rows.length === 0 && (
            <p className="py-3 text-ink-2">None for this circuit.</p>
          )}
          {open.isError && <p className="py-3 text-ink-2">They cannot be read just now.</p>}
          <ul>
            {(open.data?.rows ?? []).map((row) => (
              <li key={row.id} className="border-b border-line">
                <Link
                  href={`/circuits/${circuitId}/traces/${row.id}`}
                  className="flex min-h-bay items-center gap-3 py-2 no-underline hover:bg-panel"
                >
                  <span className="min-w-0 flex-1">
                    <b className="block">{row.vehicle || row.title}</b>
                    <span className="block truncate text-small text-ink-2">
                      {row.complaint || 'no complaint noted'}, {row.readings}{' '}
                      {row.readings === 1 ? 'reading' : 'readings'}, {row.by}
                    </span>
                  </span>
                  {row.codes[0] && <Plate>{row.codes[0]}</Plate>}
                </Link>
              </li>
            ))}
          </ul>
        </section>
      </main>
    </>
  )
}
