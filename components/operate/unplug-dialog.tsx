'use client'

import type { Circuit } from '@/diagrams/document/circuit-schema'
import { connectorName, nodeName } from '@/diagrams/document/points'
import { Choice } from '../ui/choice'
import { Dialog } from '../ui/dialog'

const choices = [
  { value: 'in', label: 'In' },
  { value: 'out', label: 'Out' },
] as const

/** Which connectors are opened and which fuses and relays are pulled. */
export function UnplugDialog({
  circuit,
  unplugged,
  onPlug,
  open,
  onClose,
}: {
  circuit: Circuit
  unplugged: readonly string[]
  onPlug: (id: string, open: boolean) => void
  open: boolean
  onClose: () => void
}) {
  const places = [
    ...circuit.connectors.map((connector) => ({
      id: connector.id,
      name: connectorName(connector),
      about: connector.location || 'connector',
    })),
    ...circuit.nodes
      .filter((node) => node.kind === 'fuse' || node.kind === 'relay')
      .map((node) => ({ id: node.id, name: nodeName(node), about: node.kind })),
  ]
  return (
    <Dialog open={open} onClose={onClose} title="Unplug or pull a part" closeLabel="Done">
      {places.length === 0 && <p>This circuit has no connector, fuse or relay.</p>}
      <ul className="max-h-[55dvh] overflow-y-auto border-t border-line">
        {places.map((place) => (
          <li key={place.id} className="flex items-center gap-3 border-b border-line py-1.5 pr-1">
            <span className="min-w-0 flex-1">
              <span className="block font-bold">{place.name}</span>
              <span className="block text-small text-ink-2">{place.about}</span>
            </span>
            <Choice
              label={place.name}
              options={choices}
              value={unplugged.includes(place.id) ? 'out' : 'in'}
              onChange={(value) => onPlug(place.id, value === 'out')}
            />
          </li>
        ))}
      </ul>
    </Dialog>
  )
}
