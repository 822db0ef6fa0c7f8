'use client'

import { useMemo, useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Answer } from '@/diagrams/faults/answer'
import { putFinding, putProof } from '@/lib/client/api/traces'
import type { Called } from '@/lib/client/api/call-api'
import type { PutFinding, PutProof, Trace } from '@/lib/shared/api/traces'
import { Button } from '../../ui/button'
import { Dialog } from '../../ui/dialog'
import type { TraceWork } from '../use-trace'
import { FindingForm } from './finding-form'
import { ProofForm } from './proof-form'
import { proofSteps } from './proof-steps'

/** Ends a trace: what was found and repaired, then the confirming reading. */
export function FinishDialog({
  circuit,
  work,
  answer,
  open,
  onClose,
}: {
  circuit: Circuit
  work: TraceWork
  answer: Answer | null
  open: boolean
  onClose: () => void
}) {
  const { trace } = work
  const [again, setAgain] = useState(false)
  const [sending, setSending] = useState(false)
  const [failure, setFailure] = useState<string | null>(null)
  const proving = trace.finding !== null && !again
  const { steps, choices } = useMemo(
    () =>
      open && proving
        ? proofSteps(circuit, trace.finding, work.readings, answer)
        : { steps: [], choices: [] },
    [open, proving, circuit, trace.finding, work.readings, answer],
  )

  const send = async (call: () => Promise<Called<Trace>>): Promise<boolean> => {
    setSending(true)
    setFailure(null)
    // The readings go first: the finding rests on them.
    const sent = await work.allSent()
    const called: Called<Trace> | null = sent ? await call() : null
    setSending(false)
    if (!called) {
      setFailure(
        'The readings are still on this tablet. What is typed here stays; try again when they are sent.',
      )
      return false
    }
    if (!called.ok) {
      setFailure(called.failure.message)
      return false
    }
    work.replace(called.value)
    return true
  }
  const record = async (finding: PutFinding) => {
    if (await send(() => putFinding(trace.id, finding))) setAgain(false)
  }
  const prove = async (proof: PutProof) => {
    if ((await send(() => putProof(trace.id, proof))) && proof.works) onClose()
  }
  const close = () => {
    setAgain(false)
    setFailure(null)
    onClose()
  }
  return (
    <Dialog
      open={open}
      onClose={close}
      title={proving ? 'Prove the repair' : 'What was found'}
      actions={proving ? <Button onClick={() => setAgain(true)}>Change what was found</Button> : null}
    >
      {proving ? (
        <>
          {trace.proof && !trace.proof.works && (
            <p className="mb-3 font-bold">The last proof said that it does not work yet.</p>
          )}
          {steps.length > 0 && (
            <>
              <h3 className="text-body font-bold">What proves it, in this order</h3>
              <ol className="mt-1 mb-3 list-decimal pl-6 text-dense text-ink-2">
                {steps.map((says) => (
                  <li key={says} className="py-1">
                    {says}
                  </li>
                ))}
              </ol>
            </>
          )}
          <ProofForm circuit={circuit} choices={choices} sending={sending} failure={failure} onSend={prove} />
        </>
      ) : (
        <FindingForm
          circuit={circuit}
          answer={answer}
          stored={trace.finding}
          sending={sending}
          failure={failure}
          onSend={record}
        />
      )}
    </Dialog>
  )
}
