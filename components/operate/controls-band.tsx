'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { Button } from '../ui/button'
import { Choice } from '../ui/choice'
import { classNames } from '../ui/class-names'
import { UnplugDialog } from './unplug-dialog'
import type { Operation } from './use-operation'
import { whatHappens } from './what-happens'

const batteryChoices = [
  { value: 'on', label: 'on' },
  { value: 'off', label: 'off' },
] as const

/** The controls of the circuit in the place of the rule: every position visible, and in words what they do. */
export function ControlsBand({
  circuit,
  operation,
  className,
}: {
  circuit: Circuit
  operation: Operation
  className?: string
}) {
  const [unplugging, setUnplugging] = useState(false)
  const { condition, positions, now, act } = operation
  const happening = now.ok ? whatHappens(circuit, now.value) : null
  const out = condition.unplugged.length
  return (
    <section
      aria-label="Controls"
      className={classNames(
        'flex flex-wrap items-center gap-x-4 gap-y-2 laptop:gap-x-6 border-t-2 border-ink bg-panel px-3 py-3 tablet:px-5',
        className,
      )}
    >
      {circuit.controls.map((control) => (
        <Choice
          key={control.id}
          label={control.label || control.id}
          showLabel
          size="bay"
          options={control.positions.map((position) => ({ value: position, label: position }))}
          value={positions[control.id] ?? control.rest}
          onChange={(position) => act({ do: 'turn', control: control.id, position })}
        />
      ))}
      <Choice
        label="Battery"
        showLabel
        size="bay"
        options={batteryChoices}
        value={condition.battery ? 'on' : 'off'}
        onChange={(value) => act({ do: 'battery', connected: value === 'on' })}
      />
      {/* One flexible piece: a longer sentence must not move the button to a new line and the sheet with it. */}
      <div className="contents tablet:flex tablet:min-w-72 tablet:flex-1 tablet:items-center tablet:justify-end tablet:gap-4">
        <div
          role="status"
          className="min-w-0 max-tablet:order-first max-tablet:w-full tablet:max-w-96 tablet:text-right"
        >
          <p className="line-clamp-2 font-bold leading-tight">
            {happening ? happening.does : now.ok ? '' : now.problem.message}
          </p>
          <p className="text-small text-ink-2 max-tablet:hidden">{happening?.draws}</p>
        </div>
        <Button size="bay" className="flex-none" onClick={() => setUnplugging(true)}>
          {out > 0 ? (
            `${out} unplugged`
          ) : (
            <span>
              Unplug<span className="max-tablet:sr-only"> or pull a part</span>
            </span>
          )}
        </Button>
      </div>
      <UnplugDialog
        circuit={circuit}
        unplugged={condition.unplugged}
        onPlug={(id, open) => act({ do: 'plug', id, open })}
        open={unplugging}
        onClose={() => setUnplugging(false)}
      />
    </section>
  )
}
