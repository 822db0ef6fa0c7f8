'use client'

import { useState } from 'react'
import { unplugFor } from '@/diagrams/distance/open-ends'
import { distanceProbes } from '@/diagrams/distance-to-fault'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { unpluggedName } from '@/lib/client/meter/reading-words'
import { Choice } from '../../ui/choice'
import { Field } from '../../ui/field'
import { distanceTyped, type TypedDistance, typedFigure, untyped } from './typed-distance'

type Key = Exclude<keyof TypedDistance, 'by' | 'leads'>

/** What to measure for it, the figures, and the place they give. */
export function DistanceFields({
  circuit,
  wire: wireId,
  other,
}: {
  circuit: Circuit
  wire: string
  other: string | null
}) {
  const [typed, setTyped] = useState<TypedDistance>(untyped)
  const wire = circuit.wires.find((one) => one.id === wireId)
  if (!wire) return null
  const set = (change: Partial<TypedDistance>) => setTyped({ ...typed, ...change })
  const field = (key: Key, label: string, unit: string) => (
    <Field
      label={label}
      unit={unit}
      figures
      inputMode="decimal"
      autoComplete="off"
      value={typed[key]}
      error={wrong(key, typed[key]) ? 'A figure, such as 3.4' : undefined}
      onChange={(event) => set({ [key]: event.target.value })}
    />
  )
  const probes = distanceProbes(circuit, wireId, other)
  const leads = (index: number) => {
    const probe = probes[index]
    return probe?.kind === 'ohms'
      ? `${pointName(circuit, probe.red)} to ${pointName(circuit, probe.black)}`
      : ''
  }
  const [from, to] = [pointName(circuit, wire.from), pointName(circuit, wire.to)]
  const found = distanceTyped(circuit, wireId, other, typed)
  return (
    <div className="flex flex-col gap-3">
      <Choice
        label="How it is measured"
        value={typed.by}
        onChange={(by) => set({ by })}
        options={[
          { value: 'ohms', label: 'Ohms from both ends' },
          { value: 'millivolts', label: 'Millivolts at a current' },
        ]}
        fill
      />
      {typed.by === 'ohms' ? (
        <>
          <p className="text-dense text-ink-2">
            {unplugWords(circuit, wire.from, wire.to)} Disconnect the battery.
          </p>
          <div className="grid gap-2 tablet:grid-cols-2">
            {field('nearOhms', leads(0), 'ohm')}
            {field('farOhms', leads(1), 'ohm')}
            {probes.length > 2 && field('wholeOhms', `${leads(2)}, if read`, 'ohm')}
            {field('ohmsGoodTo', 'The meter is good to', 'ohm')}
          </div>
          <Choice
            label="Test leads"
            showLabel
            value={typed.leads}
            onChange={(leads) => set({ leads })}
            options={[
              { value: 'zeroed', label: 'Zeroed' },
              { value: 'in-them', label: 'Still in the figures' },
            ]}
          />
        </>
      ) : (
        <>
          <p className="text-dense text-ink-2">
            {unplugWords(circuit, wire.from, wire.to)} Send a current into one end through a fused test lamp,
            and read the volts from that end to the other open one. From both ends in turn it is surest.
          </p>
          <div className="grid gap-2 tablet:grid-cols-2">
            {field('nearMillivolts', `Drop, fed at ${from}`, 'mV')}
            {field('nearAmps', `Current fed at ${from}`, 'A')}
            {field('farMillivolts', `Drop, fed at ${to}`, 'mV')}
            {field('farAmps', `Current fed at ${to}`, 'A')}
            {field('millivoltsGoodTo', 'The meter is good to', 'mV')}
          </div>
        </>
      )}
      <div className="grid gap-2 tablet:grid-cols-2">{field('celsius', 'The wire is at', '°C')}</div>
      <p className="text-small text-ink-2">
        Drawn as {wire.length} m of {wire.mm2} mm². Its ohms may differ from that by 5 %.
      </p>
      <p role="status" className="min-h-[3.25rem] border-t border-line pt-3 text-lead font-bold">
        {found ? (found.ok ? found.value.says : found.problem.message) : 'Type what the meter shows.'}
      </p>
    </div>
  )
}

function wrong(key: Key, text: string): boolean {
  return text.trim() !== '' && typedFigure(key === 'celsius' ? text.trim().replace(/^-/, '') : text) === null
}

function unplugWords(circuit: Circuit, ...ends: string[]): string {
  const names = [...new Set(ends.flatMap((end) => unplugFor(circuit, end) ?? []))].map((id) =>
    unpluggedName(circuit, id),
  )
  const fixed = ends.filter((end) => unplugFor(circuit, end) === null).map((end) => pointName(circuit, end))
  const words = names.length > 0 ? [`Unplug ${names.join(' and ')}.`] : []
  if (fixed.length > 0) words.push(`Part the wire at ${fixed.join(' and at ')}.`)
  return words.join(' ')
}
