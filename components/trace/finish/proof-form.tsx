'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import type { Reading } from '@/diagrams/document/reading-schema'
import { cleanText } from '@/lib/client/meter/typed-text'
import { readingFrom } from '@/lib/client/meter/reading-from'
import {
  capital,
  conditionWords,
  measuredWords,
  unitWords,
  valueWords,
} from '@/lib/client/meter/reading-words'
import { doubtTyped, typedValue } from '@/lib/client/meter/typed-value'
import { newId } from '@/lib/client/new-id'
import type { PutProof } from '@/lib/shared/api/traces'
import { Button } from '../../ui/button'
import { Choice } from '../../ui/choice'
import { Field, FieldBox, FieldMessage } from '../../ui/field'
import type { ConfirmingReading } from './confirming-readings'

const yesNo = [
  { value: 'yes', label: 'Works' },
  { value: 'no', label: 'Does not' },
] as const

const levels = [
  { value: 'yes', label: 'High' },
  { value: 'no', label: 'Low' },
] as const
const unsaid = {
  volts: 'Type what the meter shows now.',
  ohms: 'Type what the meter shows now.',
  amps: 'Type what the meter shows now.',
  works: 'Say whether it works.',
  sees: 'Say what the module sees.',
}

/** The confirming reading after the repair, and whether the circuit does its job again. */
export function ProofForm({
  circuit,
  choices,
  sending,
  failure,
  onSend,
}: {
  circuit: Circuit
  choices: readonly ConfirmingReading[]
  sending: boolean
  failure: string | null
  onSend: (proof: PutProof) => void
}) {
  const [number, setNumber] = useState(choices[0]?.number ?? '')
  const [text, setText] = useState('')
  const [said, setSaid] = useState<boolean | null>(null)
  const [works, setWorks] = useState<boolean | null>(null)
  const [missing, setMissing] = useState<string | null>(null)
  const chosen = choices.find((one) => one.number === number)
  if (!chosen) return <p>Take at least one reading first: it is the one to take again after the repair.</p>
  const { kind } = chosen.probe
  const looks = kind === 'works' || kind === 'sees'

  const send = () => {
    const value = typedValue({ kind, text, works: said, sees: said === null ? null : said ? 'high' : 'low' })
    if (value === null) return setMissing(unsaid[kind])
    const doubt = doubtTyped(circuit, kind, value)
    if (doubt) return setMissing(doubt.message)
    if (works === null) return setMissing('Say whether the circuit works now.')
    const reading: Reading | null = readingFrom(newId(), chosen.probe, value)
    if (!reading) return setMissing('This reading needs another kind of figure.')
    setMissing(null)
    onSend({ reading, works })
  }
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault()
        send()
      }}
    >
      {choices.length > 1 && (
        <FieldBox label="Reading to take again" htmlFor="proof-reading">
          <select
            id="proof-reading"
            value={number}
            onChange={(event) => {
              setNumber(event.target.value)
              setText('')
              setSaid(null)
            }}
            className="min-h-8 w-full bg-window font-bold outline-none"
          >
            {choices.map((one) => (
              <option key={one.number} value={one.number}>
                {one.number}: {one.words}
              </option>
            ))}
          </select>
        </FieldBox>
      )}
      <p>
        <b>{measuredWords(circuit, chosen.probe)}</b>.{' '}
        {capital(conditionWords(circuit, chosen.probe.condition))}. A good circuit shows{' '}
        <b className="figures">{valueWords(kind, chosen.good)}</b>.
      </p>
      {looks ? (
        <Choice
          label={kind === 'sees' ? 'The module sees now' : 'It now'}
          showLabel
          size="bay"
          options={kind === 'sees' ? levels : yesNo}
          value={said === null ? null : said ? 'yes' : 'no'}
          onChange={(value) => setSaid(value === 'yes')}
        />
      ) : (
        <Field
          label="The meter shows now"
          figures
          inputMode="decimal"
          autoComplete="off"
          unit={unitWords[kind]}
          value={text}
          onChange={(event) => setText(cleanText(event.target.value))}
          inputClassName="text-count"
        />
      )}
      <Choice
        label="The circuit now"
        showLabel
        size="bay"
        options={yesNo}
        value={works === null ? null : works ? 'yes' : 'no'}
        onChange={(value) => setWorks(value === 'yes')}
      />
      {(missing ?? failure) && <FieldMessage id="proof-failure">{missing ?? failure}</FieldMessage>}
      <Button type="submit" look="filled" size="bay" disabled={sending}>
        {sending ? 'Saving' : 'Record the proof'}
      </Button>
    </form>
  )
}
