'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { type Mode, siteName, sitesOf } from '@/diagrams/document/sites'
import type { Answer } from '@/diagrams/faults/answer'
import type { PutFinding, Trace } from '@/lib/shared/api/traces'
import { Button } from '../../ui/button'
import { Choice } from '../../ui/choice'
import { FieldBox, FieldMessage, TextArea } from '../../ui/field'
import { modeWords } from '../site-words'
import { likeliestMode } from '../likeliest-mode'

const nothing = 'nothing'

/** What was found, what was done about it. Filled in with the evaluator's verdict, to be confirmed or changed. */
export function FindingForm({
  circuit,
  answer,
  stored,
  sending,
  failure,
  onSend,
}: {
  circuit: Circuit
  answer: Answer | null
  stored: Trace['finding']
  sending: boolean
  failure: string | null
  onSend: (finding: PutFinding) => void
}) {
  const located = answer?.sites.find((one) => one.verdict === 'faulty')
  const [site, setSite] = useState<string>(stored ? (stored.site ?? nothing) : (located?.site ?? nothing))
  const [mode, setMode] = useState<Mode | null>(
    stored ? stored.mode : located ? (likeliestMode(located)?.mode ?? null) : null,
  )
  const [note, setNote] = useState(stored?.note ?? '')
  const [repaired, setRepaired] = useState<boolean | null>(stored ? stored.repaired : null)
  const [missing, setMissing] = useState<string | null>(null)
  const chance = new Map((answer?.sites ?? []).map((one) => [one.site, one.probability]))
  const sites = sitesOf(circuit).toSorted(
    (one, other) => (chance.get(other.id) ?? 0) - (chance.get(one.id) ?? 0),
  )
  const modes = sites.find((one) => one.id === site)?.modes ?? []

  const send = () => {
    if (site !== nothing && mode === null) return setMissing('Say how it failed.')
    if (repaired === null && site !== nothing) return setMissing('Say whether it is repaired.')
    setMissing(null)
    onSend({
      site: site === nothing ? null : site,
      mode: site === nothing ? null : mode,
      note,
      repaired: repaired ?? false,
    })
  }
  return (
    <form
      className="grid gap-3"
      onSubmit={(event) => {
        event.preventDefault()
        send()
      }}
    >
      <FieldBox label="What was found, place" htmlFor="finding-site">
        <select
          id="finding-site"
          value={site}
          onChange={(event) => {
            const chosen = event.target.value
            setSite(chosen)
            const own = sites.find((one) => one.id === chosen)?.modes ?? []
            if (mode === null || !own.includes(mode)) setMode(own.length === 1 ? (own[0] ?? null) : null)
          }}
          className="min-h-8 w-full bg-window font-bold outline-none"
        >
          <option value={nothing}>Nothing was found</option>
          {sites.map((one) => (
            <option key={one.id} value={one.id}>
              {siteName(circuit, one.id)}
            </option>
          ))}
        </select>
      </FieldBox>
      {site !== nothing && (
        <>
          <FieldBox label="How it failed" htmlFor="finding-mode">
            <select
              id="finding-mode"
              value={mode ?? ''}
              onChange={(event) => setMode(modes.find((one) => one === event.target.value) ?? null)}
              className="min-h-8 w-full bg-window font-bold outline-none"
            >
              <option value="">choose</option>
              {modes.map((one) => (
                <option key={one} value={one}>
                  {modeWords[one]}
                </option>
              ))}
            </select>
          </FieldBox>
          <Choice
            label="Repaired"
            showLabel
            size="bay"
            options={[
              { value: 'yes', label: 'Yes' },
              { value: 'no', label: 'Not yet' },
            ]}
            value={repaired === null ? null : repaired ? 'yes' : 'no'}
            onChange={(value) => setRepaired(value === 'yes')}
          />
        </>
      )}
      <TextArea
        label="What was repaired, notes"
        rows={3}
        maxLength={4000}
        value={note}
        onChange={(event) => setNote(event.target.value)}
      />
      {(missing ?? failure) && <FieldMessage id="finding-failure">{missing ?? failure}</FieldMessage>}
      <Button type="submit" look="filled" size="bay" disabled={sending}>
        {sending ? 'Saving' : 'Record what was found'}
      </Button>
    </form>
  )
}
