'use client'

import { useState } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { positionsIn } from '@/diagrams/document/condition'
import { fusedLeadOhms, testLampOhms } from '@/diagrams/document/condition-words'
import {
  type AddedLead,
  type MeterAction,
  type MeterState,
  takesFigure,
} from '@/lib/client/meter/meter-state'
import { unpluggedName } from '@/lib/client/meter/reading-words'
import { UnplugDialog } from '../../operate/unplug-dialog'
import { Chip } from '../../ui/chip'
import { AddedDialog } from './added-dialog'
import type { PickChoice } from './pick-dialog'

/** The state of the vehicle while the reading is taken, a chip each; pressing one moves it to the next position. */
export function ConditionChips({
  circuit,
  state,
  act,
  points,
}: {
  circuit: Circuit
  state: MeterState
  act: (action: MeterAction) => void
  /** Where a lead can be put in. */
  points: readonly PickChoice[]
}) {
  const [unplugging, setUnplugging] = useState(false)
  const [puttingIn, setPuttingIn] = useState(false)
  const { condition } = state
  const positions = positionsIn(circuit, condition.controls)
  const out = condition.unplugged.map((id) => unpluggedName(circuit, id))
  const battery = !condition.battery ? 'off' : condition.charging ? 'charging' : 'on'
  return (
    <div
      role="group"
      aria-label="Conditions"
      // One row that scrolls sideways; two on a tablet, where the keys below need the height.
      className="-mx-1 flex gap-2 overflow-x-auto px-1 py-1 *:flex-none tablet:max-laptop:grid tablet:max-laptop:auto-cols-max tablet:max-laptop:grid-flow-col tablet:max-laptop:grid-rows-2 laptop:*:gap-1.5 laptop:*:px-3 laptop:*:text-dense"
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
      {takesFigure(state.kind) && (
        <Chip
          name="Harness"
          position={state.moved ? 'moved' : 'still'}
          aria-pressed={state.moved !== null}
          data-control="harness"
          onClick={() => act({ do: 'move-harness', moved: state.moved === null })}
        />
      )}
      <Chip
        name="Put in"
        position={addedPosition(condition.added)}
        data-control="put-in"
        onClick={() => setPuttingIn(true)}
      />
      <AddedDialog
        circuit={circuit}
        added={condition.added}
        points={points}
        open={puttingIn}
        onPutIn={(lead) => act({ do: 'put-in', lead })}
        onTakeOut={(index) => act({ do: 'take-out', index })}
        onClose={() => setPuttingIn(false)}
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

/** "nothing", "fused lead", "test lamp", "load", "2 leads". */
function addedPosition(added: readonly AddedLead[]): string {
  const [first, ...more] = added
  if (!first) return 'nothing'
  if (more.length > 0) return `${added.length} leads`
  if (first.ohms === fusedLeadOhms) return 'fused lead'
  return first.ohms === testLampOhms ? 'test lamp' : 'load'
}
