'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { addedWords, fusedLeadOhms, testLampOhms } from '@/diagrams/document/condition-words'
import { pointName } from '@/diagrams/document/points'
import type { AddedLead } from '@/lib/client/meter/meter-state'
import { capital } from '@/lib/client/meter/reading-words'
import { Button } from '../../ui/button'
import { Choice } from '../../ui/choice'
import { Dialog } from '../../ui/dialog'
import { Field, FieldMessage } from '../../ui/field'
import { PickDialog, type PickChoice } from './pick-dialog'
import { PickField } from './pick-field'

const kinds = [
  { value: 'lead', label: 'Fused lead' },
  { value: 'lamp', label: 'Test lamp' },
  { value: 'load', label: 'Load' },
] as const
type Kind = (typeof kinds)[number]['value']

/** Leads and stand-in loads put in for the reading: a bridge in a relay's socket, a test lamp to load a line. */
export function AddedDialog({
  circuit,
  added,
  points,
  open,
  onPutIn,
  onTakeOut,
  onClose,
}: {
  circuit: Circuit
  added: readonly AddedLead[]
  points: readonly PickChoice[]
  open: boolean
  onPutIn: (lead: AddedLead) => void
  onTakeOut: (index: number) => void
  onClose: () => void
}) {
  return (
    <Dialog open={open} onClose={onClose} title="Put in for this reading" closeLabel="Done">
      <p className="text-dense text-ink-2">
        Any bypass is fused, never above the circuit&apos;s own fuse. The vehicle maker&apos;s service
        information comes first.
      </p>
      {added.length > 0 && (
        <ul className="mt-3 max-h-[24dvh] overflow-y-auto border-t border-line">
          {added.map((lead, index) => (
            <li
              key={`${lead.from} ${lead.to} ${index}`}
              className="flex items-center gap-3 border-b border-line py-1.5"
            >
              <span className="min-w-0 flex-1 font-bold">{capital(addedWords(circuit, lead))}</span>
              <Button onClick={() => onTakeOut(index)}>Take out</Button>
            </li>
          ))}
        </ul>
      )}
      <PutIn circuit={circuit} points={points} onPutIn={onPutIn} />
    </Dialog>
  )
}

/** What it is, from where to where. */
function PutIn({
  circuit,
  points,
  onPutIn,
}: {
  circuit: Circuit
  points: readonly PickChoice[]
  onPutIn: (lead: AddedLead) => void
}) {
  const [kind, setKind] = useState<Kind>('lead')
  const [from, setFrom] = useState<string | null>(null)
  const [to, setTo] = useState<string | null>(null)
  const [ohms, setOhms] = useState('')
  const [picking, setPicking] = useState<'from' | 'to' | null>(null)
  const [problem, setProblem] = useState<string | null>(null)

  const putIn = () => {
    if (from === null || to === null) return setProblem('Pick both ends first.')
    if (from === to) return setProblem(`Both ends are on ${pointName(circuit, from)}.`)
    const typed = Number(ohms.replace(',', '.'))
    if (kind === 'load' && !(typed >= 0.1 && typed <= 1e6))
      return setProblem(
        `Load: ${ohms.trim() === '' ? 'nothing typed' : `${ohms} ohm`}, expected 0.1 to 1,000,000 ohm.`,
      )
    setProblem(null)
    onPutIn({ from, to, ohms: kind === 'lead' ? fusedLeadOhms : kind === 'lamp' ? testLampOhms : typed })
    setFrom(null)
    setTo(null)
  }
  return (
    <div className="mt-3 grid gap-2">
      <Choice label="What is put in" options={kinds} value={kind} onChange={setKind} fill tight />
      <div className="flex gap-2">
        <PickField
          label="From"
          value={from === null ? null : pointName(circuit, from)}
          unset="pick a point"
          onPress={() => setPicking('from')}
        />
        <PickField
          label="To"
          value={to === null ? null : pointName(circuit, to)}
          unset="pick a point"
          onPress={() => setPicking('to')}
        />
      </div>
      {kind === 'load' && (
        <Field
          label="Its resistance"
          figures
          inputMode="decimal"
          autoComplete="off"
          unit="ohm"
          value={ohms}
          onChange={(event) => setOhms(event.target.value)}
        />
      )}
      {problem && <FieldMessage id="put-in-problem">{problem}</FieldMessage>}
      <Button look="filled" size="bay" onClick={putIn}>
        Put it in
      </Button>
      <PickDialog
        title={picking === 'to' ? 'To which point' : 'From which point'}
        choices={points}
        open={picking !== null}
        onPick={(point) => (picking === 'to' ? setTo(point) : setFrom(point))}
        onClose={() => setPicking(null)}
      />
    </div>
  )
}
