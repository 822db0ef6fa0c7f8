'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { pointName } from '@/diagrams/document/points'
import { siteName } from '@/diagrams/document/sites'
import type { MeterAction, MeterState } from '@/lib/client/meter/meter-state'
import { LeadField } from './lead-field'
import type { Listing } from './meter-lists'
import { PickField } from './pick-field'

/** What the reading is of: two leads, a wire in the clamp, a load that is looked at, an input in the live data. */
export function MeasuredRow({
  circuit,
  state,
  act,
  onList,
}: {
  circuit: Circuit
  state: MeterState
  act: (action: MeterAction) => void
  onList: (listing: Listing) => void
}) {
  return (
    <div className="flex gap-2">
      {state.kind === 'volts' || state.kind === 'ohms' ? (
        (['red', 'black'] as const).map((lead) => (
          <LeadField
            key={lead}
            lead={lead}
            point={leadWords(circuit, state, lead)}
            active={state.lead === lead}
            onPress={() => {
              act({ do: 'pick-lead', lead })
              onList(lead)
            }}
          />
        ))
      ) : state.kind === 'amps' ? (
        <PickField
          label="Clamp round"
          value={state.wire === null ? null : siteName(circuit, `wire:${state.wire}`)}
          unset="tap a wire"
          onPress={() => onList('wire')}
        />
      ) : state.kind === 'sees' ? (
        <PickField
          label="The module reports its input"
          value={state.pin === null ? null : pointName(circuit, state.pin)}
          unset="tap its pin"
          onPress={() => onList('pin')}
        />
      ) : (
        <PickField
          label="Does its job"
          value={state.node === null ? null : siteName(circuit, `part:${state.node}`)}
          unset="tap a load"
          onPress={() => onList('node')}
        />
      )}
    </div>
  )
}

function leadWords(circuit: Circuit, state: MeterState, lead: 'red' | 'black'): string | null {
  const point = lead === 'red' ? state.red : state.black
  return point === null ? null : pointName(circuit, point)
}
