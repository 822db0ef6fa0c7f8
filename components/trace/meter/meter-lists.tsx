'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { siteName } from '@/diagrams/document/sites'
import type { MeterAction } from '@/lib/client/meter/meter-state'
import { moduleInputs } from './module-inputs'
import { PickDialog, type PickChoice } from './pick-dialog'

/** Which of the lists stands open. */
export type Listing = 'red' | 'black' | 'wire' | 'node' | 'pin' | null

/** Lists of points, wires and loads, for whoever would rather read a name than hit a spot. */
export function MeterLists({
  circuit,
  points,
  act,
  listing,
  onClose,
}: {
  circuit: Circuit
  points: readonly PickChoice[]
  act: (action: MeterAction) => void
  listing: Listing
  onClose: () => void
}) {
  return (
    <>
      <PickDialog
        title={listing === 'black' ? 'Black lead' : 'Red lead'}
        choices={points}
        open={listing === 'red' || listing === 'black'}
        onPick={(point) => act({ do: 'put-lead', lead: listing === 'black' ? 'black' : 'red', point })}
        onClose={onClose}
      />
      <PickDialog
        title="Clamp round which wire"
        choices={circuit.wires.map((wire) => ({
          id: wire.id,
          name: siteName(circuit, `wire:${wire.id}`),
          about: wire.colour,
        }))}
        open={listing === 'wire'}
        onPick={(wire) => act({ do: 'tap-wire', wire })}
        onClose={onClose}
      />
      <PickDialog
        title="Which input of a module"
        choices={moduleInputs(circuit).map((pin) => ({ id: pin, name: pointName(circuit, pin) }))}
        open={listing === 'pin'}
        onPick={(pin) => act({ do: 'tap-pin', pin })}
        onClose={onClose}
      />
      <PickDialog
        title="Which load"
        choices={circuit.nodes
          .filter((node) => node.kind === 'load')
          .map((node) => ({ id: node.id, name: siteName(circuit, `part:${node.id}`) }))}
        open={listing === 'node'}
        onPick={(node) => act({ do: 'tap-load', node })}
        onClose={onClose}
      />
    </>
  )
}
