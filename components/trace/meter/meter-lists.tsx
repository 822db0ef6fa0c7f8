'use client'

import { useMemo } from 'react'
import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { siteName } from '@/diagrams/document/sites'
import type { MeterAction, MeterState } from '@/lib/client/meter/meter-state'
import { pointPlaces } from '../../canvas/point-place'
import { PickDialog } from './pick-dialog'

/** Which of the lists stands open. */
export type Listing = 'red' | 'black' | 'wire' | 'node' | null

/** Lists of points, wires and loads, for whoever would rather read a name than hit a spot. */
export function MeterLists({
  circuit,
  state,
  act,
  listing,
  onClose,
}: {
  circuit: Circuit
  state: MeterState
  act: (action: MeterAction) => void
  listing: Listing
  onClose: () => void
}) {
  const points = useMemo(
    () => [
      { id: 'chassis', name: 'chassis', about: '0 V' },
      ...pointPlaces(circuit, state.condition.unplugged).map(({ point }) => ({
        id: point,
        name: pointName(circuit, point),
      })),
    ],
    [circuit, state.condition.unplugged],
  )
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
