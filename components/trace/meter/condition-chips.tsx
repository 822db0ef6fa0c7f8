'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { positionsIn } from '@/diagrams/document/condition'
import type { MeterAction, MeterState } from '@/lib/client/meter/meter-state'
import { unpluggedName } from '@/lib/client/meter/reading-words'
import { UnplugDialog } from '../../operate/unplug-dialog'
import { Chip } from '../../ui/chip'

/** The state of the vehicle while the reading is taken, a chip each; pressing one moves it to the next position. */
export function ConditionChips({
  circuit,
  state,
  act,
}: {
  circuit: Circuit
  state: MeterState
  act: (action: MeterAction) => void
}) {
  const [unplugging, setUnplugging] = useState(false)
  const { condition } = state
  const positions = positionsIn(circuit, condition.controls)
  const out = condition.unplugged.map((id) => unpluggedName(circuit, id))
  const battery = !condition.battery ? 'off' : condition.charging ? 'charging' : 'on'
  return (
    <div
      role="group"
      aria-label="Conditions"
      className="flex flex-wrap gap-2 max-tablet:-mx-1 max-tablet:flex-nowrap max-tablet:overflow-x-auto max-tablet:px-1 max-tablet:py-1 max-tablet:*:flex-none laptop:-mx-1 laptop:flex-nowrap laptop:overflow-x-auto laptop:px-1 laptop:py-1 laptop:*:flex-none laptop:*:gap-1.5 laptop:*:px-3 laptop:*:text-dense"
    >
      {circuit.controls.map((control) => {
        const position = positions[control.id] ?? control.rest
        const next = control.positions[(control.positions.indexOf(position) + 1) % control.positions.length]
        return (
          <Chip
            key={control.id}
            name={control.label || control.id}
            position={position}
            data-control={control.id}
            onClick={() => next !== undefined && act({ do: 'turn', control: control.id, position: next })}
          />
        )
      })}
      <Chip
        name="Unplugged"
        position={out.length === 0 ? 'none' : out.length > 2 ? `${out.length} parts` : out.join(', ')}
        data-control="unplugged"
        onClick={() => setUnplugging(true)}
      />
      <Chip
        name="Battery"
        position={battery}
        data-control="battery"
        onClick={() => {
          // On, charging, off, and round again.
          if (battery === 'on') act({ do: 'charging', charging: true })
          else if (battery === 'charging') act({ do: 'battery', connected: false })
          else act({ do: 'battery', connected: true })
        }}
      />
      <UnplugDialog
        circuit={circuit}
        unplugged={condition.unplugged}
        onPlug={(id, open) => act({ do: 'plug', id, open })}
        open={unplugging}
        onClose={() => setUnplugging(false)}
      />
    </div>
  )
}
