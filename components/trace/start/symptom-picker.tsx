'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { nodeName } from '@/diagrams/document/points'
import type { Symptom } from '@/diagrams/faults/symptom-schema'
import { classNames } from '../../ui/class-names'
import { Choice } from '../../ui/choice'
import { Tick } from '../../ui/glyphs'

const doings = [
  { value: 'as-it-should', label: 'Not told' },
  { value: 'not-work', label: 'Does not' },
  { value: 'always', label: 'Always' },
  { value: 'weakly', label: 'Weakly' },
] as const
type Doing = (typeof doings)[number]['value']

/** What the driver tells of each load, and the step at which the sequence stops. It moves the odds and clears nothing. */
export function SymptomPicker({
  circuit,
  symptoms,
  onChange,
}: {
  circuit: Circuit
  symptoms: readonly Symptom[]
  onChange: (symptoms: Symptom[]) => void
}) {
  const loads = circuit.nodes.filter((node) => node.kind === 'load')
  if (loads.length === 0 && circuit.sequence.length === 0) return null
  const steps = symptoms.flatMap((symptom) => ('step' in symptom ? [symptom.step] : []))
  const doesOf = (id: string): Doing =>
    symptoms.flatMap((symptom) => ('node' in symptom && symptom.node === id ? [symptom.does] : []))[0] ??
    'as-it-should'
  const setDoes = (id: string, does: Doing) => {
    const others = symptoms.filter((symptom) => !('node' in symptom) || symptom.node !== id)
    onChange(does === 'as-it-should' ? others : [...others, { node: id, does }])
  }
  const setStep = (id: string) => {
    const others = symptoms.filter((symptom) => !('step' in symptom))
    onChange(steps.includes(id) ? others : [...others, { step: id }])
  }
  return (
    <fieldset className="grid gap-2">
      <legend className="mb-1 text-body font-bold">What it does</legend>
      <p className="text-small text-ink-2">
        As the driver tells it. It says where to look first; only readings prove a place good.
      </p>
      {loads.length > 0 && (
        <ul className="border-t border-line">
          {loads.map((load) => (
            <li
              key={load.id}
              className="flex flex-wrap items-center justify-between gap-x-3 gap-y-1 border-b border-line py-1.5"
            >
              <span className="min-w-32 flex-1">
                <b>{nodeName(load)}</b> <span className="text-ink-2">works</span>
              </span>
              <Choice
                label={`${nodeName(load)} works`}
                options={doings}
                value={doesOf(load.id)}
                onChange={(does: Doing) => setDoes(load.id, does)}
                tight
              />
            </li>
          ))}
        </ul>
      )}
      {circuit.sequence.length > 0 && (
        <>
          <p className="mt-1 text-dense font-bold">It stops at step</p>
          {circuit.sequence.map((step, index) => {
            const picked = steps.includes(step.id)
            return (
              <button
                key={step.id}
                type="button"
                aria-pressed={picked}
                aria-label={`Step ${index + 1}: ${step.text}`}
                onClick={() => setStep(step.id)}
                className={classNames(
                  'flex min-h-bay items-center gap-3 rounded-field bg-window px-3 py-1.5 text-left',
                  picked ? 'border-area border-ink' : 'm-px border-control border-edge hover:border-ink',
                )}
              >
                <span className="figures font-bold">{index + 1}</span>
                <span className="min-w-0 flex-1 text-dense text-ink-2">{step.text}</span>
                {picked && <Tick size={20} />}
              </button>
            )
          })}
        </>
      )}
    </fieldset>
  )
}
