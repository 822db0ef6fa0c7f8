import type { Circuit } from '../document/circuit-schema'
import type { Condition } from '../document/condition-schema'
import { conditionParts } from '../document/condition-words'
import { nodeName, pointName } from '../document/points'
import type { Probe } from '../document/reading-schema'
import { siteName } from '../document/sites'
import type { NextOutcome } from '../faults/answer'

/** "12.6 V", "0.3 ohm", "4.7 kohm", "OL", "0.14 A". */
export function figure(kind: Probe['kind'], value: number): string {
  if (kind === 'ohms') {
    if (value > 40e6) return 'OL'
    if (value >= 1e6) return `${short(value / 1e6)} Mohm`
    if (value >= 1e3) return `${short(value / 1e3)} kohm`
    return `${short(value)} ohm`
  }
  return `${short(value)} ${kind === 'amps' ? 'A' : 'V'}`
}

function short(value: number): string {
  const size = Math.abs(value)
  if (size < 0.005) return '0'
  return size >= 100 ? value.toFixed(0) : size >= 9.95 ? value.toFixed(1) : value.toFixed(2)
}

/** "Key on, C7 unplugged", empty for everything plugged in and at rest. */
export function conditionWords(circuit: Circuit, condition: Condition): string {
  return conditionParts(circuit, condition).join(', ')
}

/** "C7 cavity 2, dash side. Back-probe volts to chassis. Key on. 12.6 V leaves 2, 0 V leaves 5. About 3 minutes." */
export function nextWords(
  circuit: Circuit,
  probe: Probe,
  minutes: number,
  outcomes: readonly NextOutcome[],
): string {
  const condition = conditionWords(circuit, probe.condition)
  const leaves = outcomes.map((outcome) => `${outcome.about} leaves ${outcome.leaves.length}`).join(', ')
  const time = Math.max(1, Math.round(minutes))
  return [
    ...probeWords(circuit, probe),
    condition && capital(condition),
    leaves,
    `About ${time} ${time === 1 ? 'minute' : 'minutes'}`,
  ]
    .filter(Boolean)
    .map((part) => `${part}.`)
    .join(' ')
}

/** Place first, then what. */
export function probeWords(circuit: Circuit, probe: Probe): string[] {
  switch (probe.kind) {
    case 'volts':
      return [pointName(circuit, probe.red), `Back-probe volts to ${pointName(circuit, probe.black)}`]
    case 'ohms':
      return [pointName(circuit, probe.red), `Ohms to ${pointName(circuit, probe.black)}`]
    case 'amps':
      return [capital(siteName(circuit, `wire:${probe.wire}`)), 'Clamp amps']
    case 'works': {
      const node = circuit.nodes.find((n) => n.id === probe.node)
      return [node ? nodeName(node) : probe.node, 'See whether it works']
    }
    case 'sees':
      return [pointName(circuit, probe.pin), 'Read what the module sees']
  }
}

export function capital(text: string): string {
  return text.charAt(0).toUpperCase() + text.slice(1)
}
