'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { OpenCircuitExport } from '../circuits/open-circuit-export'
import { classNames } from '../ui/class-names'
import type { Operation } from './use-operation'

/** The circuit's own words, and its steps; the step that fits the controls as they stand is marked. */
export function HowItWorks({ circuit, operation }: { circuit: Circuit; operation: Operation }) {
  const fits = (controls: Record<string, string>) =>
    Object.entries(controls).every(([id, position]) => operation.positions[id] === position)
  return (
    <section
      aria-labelledby="how-it-works"
      // Scrolls, and holds nothing that a key could land on.
      tabIndex={0}
      className="overflow-y-auto px-3 py-3 tablet:px-5"
    >
      <h2 id="how-it-works" className="text-body font-bold">
        How it works
      </h2>
      {circuit.operation === '' && circuit.sequence.length === 0 && (
        <p className="mt-1 text-ink-2">Nothing is written about this circuit yet.</p>
      )}
      {circuit.operation.split(/\n+/).map((paragraph) => (
        <p key={paragraph} className="mt-1.5 text-body text-ink-2">
          {paragraph}
        </p>
      ))}
      {circuit.sequence.length > 0 && (
        <ol className="mt-3 border-t border-line">
          {circuit.sequence.map((step) => {
            const now = fits(step.controls)
            const setting = Object.entries(step.controls)
              .map(([id, position]) => {
                const control = circuit.controls.find((one) => one.id === id)
                return `${control?.label || id} ${position}`
              })
              .join(', ')
            return (
              <li
                key={step.id}
                aria-current={now ? 'step' : undefined}
                className={classNames('border-b border-line py-2', now && 'bg-window -mx-2 px-2')}
              >
                {setting && <span className="font-bold">{setting}. </span>}
                {step.text}
              </li>
            )
          })}
        </ol>
      )}
      {circuit.codes.map((code) => (
        <p key={`${code.code}${code.failureType ?? ''}`} className="mt-3 text-small text-ink-2">
          <span className="figures font-bold text-ink">
            {code.code}
            {code.failureType ? `-${code.failureType}` : ''}
          </span>{' '}
          {[code.text, code.setWhen].filter(Boolean).join('. ')}
        </p>
      ))}
      <div className="mt-4">
        <OpenCircuitExport />
      </div>
    </section>
  )
}
